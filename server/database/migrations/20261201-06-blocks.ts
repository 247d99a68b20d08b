import type { Migration } from '../Migration'

/**
 * The blocks of a system that loop gains are built from, with their gain in each condition; where each loop is opened and what the others do
 * meanwhile. A block without a gain of its own in a condition has that of its row; deleting is soft, and a name is unique among what is not deleted.
 */
export const blocks: Migration = {
  name: '20261201-06-blocks',
  sql: `
    ALTER TABLE loops ADD COLUMN break_at TEXT CHECK (break_at IS NULL OR json_valid(break_at));
    ALTER TABLE loops ADD COLUMN loop_states TEXT NOT NULL DEFAULT '[]' CHECK (json_valid(loop_states));

    CREATE TABLE blocks (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      system_id INTEGER NOT NULL REFERENCES systems (id),
      name TEXT NOT NULL,
      role TEXT NOT NULL CHECK (role IN ('controller', 'filter', 'actuator', 'plant', 'sensor', 'delay', 'hold', 'other')),
      unit_in TEXT NOT NULL,
      unit_out TEXT NOT NULL,
      notes TEXT NOT NULL,
      definition TEXT CHECK (definition IS NULL OR json_valid(definition)),
      upload_id INTEGER REFERENCES uploads (id),
      position INTEGER NOT NULL,
      version INTEGER NOT NULL,
      created_at TEXT NOT NULL,
      deleted_at TEXT
    ) STRICT;
    CREATE INDEX blocks_system ON blocks (system_id, position);
    CREATE UNIQUE INDEX blocks_name ON blocks (system_id, name) WHERE deleted_at IS NULL;
    CREATE INDEX blocks_upload ON blocks (upload_id);

    CREATE TABLE block_gains (
      block_id INTEGER NOT NULL REFERENCES blocks (id) ON DELETE CASCADE,
      condition_id INTEGER NOT NULL REFERENCES operating_conditions (id),
      definition TEXT NOT NULL CHECK (json_valid(definition)),
      upload_id INTEGER REFERENCES uploads (id),
      PRIMARY KEY (block_id, condition_id)
    ) STRICT;
    CREATE INDEX block_gains_condition ON block_gains (condition_id);
    CREATE INDEX block_gains_upload ON block_gains (upload_id);
  `,
}
