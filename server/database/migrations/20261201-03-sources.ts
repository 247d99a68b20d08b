import type { Migration } from '../Migration'

/**
 * Uploaded files, the sources of each loop in each condition, and the analyses already computed.
 * A loop in a condition has any number of sources; at most one that is not deleted is of record.
 */
export const sources: Migration = {
  name: '20261201-03-sources',
  sql: `
    CREATE TABLE uploads (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      system_id INTEGER NOT NULL REFERENCES systems (id),
      file_name TEXT NOT NULL,
      size INTEGER NOT NULL,
      sha256 TEXT NOT NULL,
      bytes BLOB NOT NULL,
      uploaded_by INTEGER NOT NULL REFERENCES people (id),
      created_at TEXT NOT NULL
    ) STRICT;
    CREATE INDEX uploads_system ON uploads (system_id);
    CREATE TRIGGER uploads_never_change BEFORE UPDATE ON uploads
    BEGIN SELECT RAISE(ABORT, 'an uploaded file never changes'); END;

    CREATE TABLE sources (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      loop_id INTEGER NOT NULL REFERENCES loops (id),
      condition_id INTEGER NOT NULL REFERENCES operating_conditions (id),
      name TEXT NOT NULL,
      kind TEXT NOT NULL CHECK (kind IN ('coefficients', 'zerosPoles', 'expression', 'measured')),
      definition TEXT NOT NULL CHECK (json_valid(definition)),
      upload_id INTEGER REFERENCES uploads (id),
      of_record INTEGER NOT NULL CHECK (of_record IN (0, 1)),
      set_aside_reason TEXT NOT NULL,
      version INTEGER NOT NULL,
      created_at TEXT NOT NULL,
      deleted_at TEXT,
      CHECK ((kind = 'measured') = (upload_id IS NOT NULL))
    ) STRICT;
    CREATE UNIQUE INDEX sources_of_record ON sources (loop_id, condition_id) WHERE of_record = 1 AND deleted_at IS NULL;
    CREATE INDEX sources_loop ON sources (loop_id, condition_id);
    CREATE INDEX sources_condition ON sources (condition_id);
    CREATE INDEX sources_upload ON sources (upload_id);

    CREATE TABLE analyses (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      input_hash TEXT NOT NULL,
      engine_version TEXT NOT NULL,
      result TEXT NOT NULL CHECK (json_valid(result)),
      created_at TEXT NOT NULL
    ) STRICT;
    CREATE UNIQUE INDEX analyses_input ON analyses (input_hash, engine_version);
  `,
}
