import type { Migration } from '../Migration'

/** The audit: what changed state, by whom and when. Rows are only ever added. */
export const audit: Migration = {
  name: '20261201-05-audit',
  sql: `
    CREATE TABLE audit_events (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      at TEXT NOT NULL,
      event TEXT NOT NULL,
      person_id INTEGER REFERENCES people (id),
      person_name TEXT NOT NULL,
      system_id INTEGER REFERENCES systems (id),
      subject_id TEXT,
      payload TEXT NOT NULL CHECK (json_valid(payload))
    ) STRICT;
    CREATE INDEX audit_events_system ON audit_events (system_id);
    CREATE TRIGGER audit_events_never_replaced BEFORE INSERT ON audit_events
    WHEN EXISTS (SELECT 1 FROM audit_events WHERE id = NEW.id)
    BEGIN SELECT RAISE(ABORT, 'the audit is only added to'); END;
    CREATE TRIGGER audit_events_never_change BEFORE UPDATE ON audit_events
    BEGIN SELECT RAISE(ABORT, 'the audit is only added to'); END;
    CREATE TRIGGER audit_events_never_deleted BEFORE DELETE ON audit_events
    BEGIN SELECT RAISE(ABORT, 'the audit is only added to'); END;
  `,
}
