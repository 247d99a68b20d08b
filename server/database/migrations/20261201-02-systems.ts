import type { Migration } from '../Migration'

/**
 * Systems with their members, loops, operating conditions, parameters and criteria.
 * Deleting is soft, so that it can be undone; a code is unique among what is not deleted.
 */
export const systems: Migration = {
  name: '20261201-02-systems',
  sql: `
    CREATE TABLE systems (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      name TEXT NOT NULL,
      customer TEXT NOT NULL,
      document_number TEXT NOT NULL,
      frequency_unit TEXT NOT NULL CHECK (frequency_unit IN ('rad/s', 'Hz')),
      description TEXT NOT NULL,
      version INTEGER NOT NULL,
      created_at TEXT NOT NULL,
      deleted_at TEXT
    ) STRICT;

    CREATE TABLE memberships (
      person_id INTEGER NOT NULL REFERENCES people (id),
      system_id INTEGER NOT NULL REFERENCES systems (id),
      role TEXT NOT NULL CHECK (role IN ('engineer', 'checker', 'approver', 'customer')),
      PRIMARY KEY (person_id, system_id, role)
    ) STRICT;
    CREATE INDEX memberships_system ON memberships (system_id);

    CREATE TABLE loops (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      system_id INTEGER NOT NULL REFERENCES systems (id),
      code TEXT NOT NULL,
      name TEXT NOT NULL,
      axis TEXT NOT NULL,
      break_point TEXT NOT NULL,
      other_loops TEXT NOT NULL,
      notes TEXT NOT NULL,
      position INTEGER NOT NULL,
      version INTEGER NOT NULL,
      created_at TEXT NOT NULL,
      deleted_at TEXT
    ) STRICT;
    CREATE INDEX loops_system ON loops (system_id, position);
    CREATE UNIQUE INDEX loops_code ON loops (system_id, code) WHERE deleted_at IS NULL;

    CREATE TABLE operating_conditions (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      system_id INTEGER NOT NULL REFERENCES systems (id),
      code TEXT NOT NULL,
      name TEXT NOT NULL,
      coordinates TEXT NOT NULL CHECK (json_valid(coordinates)),
      tags TEXT NOT NULL CHECK (json_valid(tags)),
      notes TEXT NOT NULL,
      position INTEGER NOT NULL,
      version INTEGER NOT NULL,
      created_at TEXT NOT NULL,
      deleted_at TEXT
    ) STRICT;
    CREATE INDEX operating_conditions_system ON operating_conditions (system_id, position);
    CREATE UNIQUE INDEX operating_conditions_code ON operating_conditions (system_id, code) WHERE deleted_at IS NULL;

    CREATE TABLE parameters (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      system_id INTEGER NOT NULL REFERENCES systems (id),
      name TEXT NOT NULL,
      unit TEXT NOT NULL,
      notes TEXT NOT NULL,
      position INTEGER NOT NULL,
      version INTEGER NOT NULL
    ) STRICT;
    -- not unique in the database: the list is replaced as a whole, and two parameters may swap their names in it
    CREATE INDEX parameters_system ON parameters (system_id, position);

    CREATE TABLE parameter_values (
      parameter_id INTEGER NOT NULL REFERENCES parameters (id) ON DELETE CASCADE,
      condition_id INTEGER NOT NULL REFERENCES operating_conditions (id),
      value REAL NOT NULL,
      PRIMARY KEY (parameter_id, condition_id)
    ) STRICT;
    CREATE INDEX parameter_values_condition ON parameter_values (condition_id);

    CREATE TABLE criteria (
      system_id INTEGER NOT NULL REFERENCES systems (id),
      quantity TEXT NOT NULL CHECK (quantity IN ('gainMargin', 'phaseMargin', 'vectorMargin', 'delayMargin')),
      limit_value REAL,
      PRIMARY KEY (system_id, quantity)
    ) STRICT;
  `,
}
