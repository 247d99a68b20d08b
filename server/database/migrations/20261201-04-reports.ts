import type { Migration } from '../Migration'

/**
 * Reports, their revisions with the artefacts, and the jobs that render them.
 * The triggers keep what was frozen: a revision's content never changes, its state only goes forward, and neither
 * revisions nor artefacts nor their bytes are ever deleted or replaced, whoever holds the database.
 */
export const reports: Migration = {
  name: '20261201-04-reports',
  sql: `
    CREATE TABLE reports (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      system_id INTEGER NOT NULL REFERENCES systems (id),
      title TEXT NOT NULL,
      document_number TEXT NOT NULL,
      loop_ids TEXT NOT NULL CHECK (json_valid(loop_ids)),
      condition_ids TEXT NOT NULL CHECK (json_valid(condition_ids)),
      remarks TEXT NOT NULL,
      loop_remarks TEXT NOT NULL CHECK (json_valid(loop_remarks)),
      version INTEGER NOT NULL,
      created_at TEXT NOT NULL,
      deleted_at TEXT
    ) STRICT;
    CREATE INDEX reports_system ON reports (system_id);

    CREATE TABLE revisions (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      report_id INTEGER NOT NULL REFERENCES reports (id),
      letter TEXT NOT NULL,
      draft_number INTEGER NOT NULL CHECK (draft_number >= 1),
      state TEXT NOT NULL CHECK (state IN ('draft', 'issued', 'superseded', 'withdrawn')),
      change_note TEXT NOT NULL,
      snapshot TEXT NOT NULL,
      snapshot_sha256 TEXT NOT NULL,
      frozen_by INTEGER NOT NULL REFERENCES people (id),
      frozen_by_name TEXT NOT NULL,
      frozen_at TEXT NOT NULL,
      issued_by INTEGER REFERENCES people (id),
      issued_by_name TEXT,
      issued_at TEXT
    ) STRICT;
    CREATE UNIQUE INDEX revisions_draft ON revisions (report_id, letter, draft_number);
    -- a letter is issued once, and one revision at a time is valid: the former is superseded before the next is issued
    CREATE UNIQUE INDEX revisions_letter ON revisions (report_id, letter) WHERE state <> 'draft';
    CREATE UNIQUE INDEX revisions_valid ON revisions (report_id) WHERE state = 'issued';

    CREATE TRIGGER revisions_begin_as_drafts BEFORE INSERT ON revisions
    WHEN NEW.state <> 'draft' OR NEW.issued_by IS NOT NULL OR NEW.issued_by_name IS NOT NULL OR NEW.issued_at IS NOT NULL
    BEGIN SELECT RAISE(ABORT, 'a revision begins as a draft'); END;

    -- INSERT OR REPLACE would delete the old row without a word
    CREATE TRIGGER revisions_never_replaced BEFORE INSERT ON revisions
    WHEN EXISTS (SELECT 1 FROM revisions WHERE id = NEW.id OR (report_id = NEW.report_id AND letter = NEW.letter AND draft_number = NEW.draft_number))
    BEGIN SELECT RAISE(ABORT, 'a frozen revision is never replaced'); END;

    CREATE TRIGGER revisions_content_never_changes BEFORE UPDATE ON revisions
    WHEN NEW.id IS NOT OLD.id OR NEW.report_id IS NOT OLD.report_id OR NEW.letter IS NOT OLD.letter OR NEW.draft_number IS NOT OLD.draft_number
      OR NEW.change_note IS NOT OLD.change_note OR NEW.snapshot IS NOT OLD.snapshot OR NEW.snapshot_sha256 IS NOT OLD.snapshot_sha256
      OR NEW.frozen_by IS NOT OLD.frozen_by OR NEW.frozen_by_name IS NOT OLD.frozen_by_name OR NEW.frozen_at IS NOT OLD.frozen_at
    BEGIN SELECT RAISE(ABORT, 'a frozen revision never changes'); END;

    CREATE TRIGGER revisions_state_goes_forward BEFORE UPDATE ON revisions
    WHEN NEW.state IS NOT OLD.state AND NOT (
      (OLD.state = 'draft' AND NEW.state = 'issued' AND NEW.issued_by IS NOT NULL AND NEW.issued_by_name IS NOT NULL AND NEW.issued_at IS NOT NULL)
      OR (OLD.state = 'issued' AND NEW.state IN ('superseded', 'withdrawn')))
    BEGIN SELECT RAISE(ABORT, 'a revision goes from draft to issued, and from issued to superseded or withdrawn'); END;

    CREATE TRIGGER revisions_issue_is_set_once BEFORE UPDATE ON revisions
    WHEN (NEW.issued_by IS NOT OLD.issued_by OR NEW.issued_by_name IS NOT OLD.issued_by_name OR NEW.issued_at IS NOT OLD.issued_at)
      AND NOT (OLD.state = 'draft' AND NEW.state = 'issued')
    BEGIN SELECT RAISE(ABORT, 'who issued a revision, and when, is set once, with its issue'); END;

    CREATE TRIGGER revisions_never_deleted BEFORE DELETE ON revisions
    BEGIN SELECT RAISE(ABORT, 'a frozen revision is never deleted'); END;

    CREATE TABLE artefact_blobs (
      sha256 TEXT NOT NULL PRIMARY KEY,
      bytes BLOB NOT NULL
    ) STRICT;
    CREATE TRIGGER artefact_blobs_never_replaced BEFORE INSERT ON artefact_blobs
    WHEN EXISTS (SELECT 1 FROM artefact_blobs WHERE sha256 = NEW.sha256 AND bytes <> NEW.bytes)
    BEGIN SELECT RAISE(ABORT, 'stored bytes are never replaced'); END;
    -- the same bytes again are already there; this also keeps INSERT OR REPLACE from deleting them
    CREATE TRIGGER artefact_blobs_stored_once BEFORE INSERT ON artefact_blobs
    WHEN EXISTS (SELECT 1 FROM artefact_blobs WHERE sha256 = NEW.sha256 AND bytes = NEW.bytes)
    BEGIN SELECT RAISE(IGNORE); END;
    CREATE TRIGGER artefact_blobs_never_change BEFORE UPDATE ON artefact_blobs
    BEGIN SELECT RAISE(ABORT, 'stored bytes never change'); END;
    CREATE TRIGGER artefact_blobs_never_deleted BEFORE DELETE ON artefact_blobs
    BEGIN SELECT RAISE(ABORT, 'stored bytes are never deleted'); END;

    CREATE TABLE artefacts (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      revision_id INTEGER NOT NULL REFERENCES revisions (id),
      edition TEXT NOT NULL CHECK (edition IN ('draft', 'issued')),
      kind TEXT NOT NULL CHECK (kind IN ('html', 'pdf', 'zip')),
      file_name TEXT NOT NULL,
      media_type TEXT NOT NULL,
      size INTEGER NOT NULL,
      sha256 TEXT NOT NULL REFERENCES artefact_blobs (sha256)
    ) STRICT;
    CREATE UNIQUE INDEX artefacts_kind ON artefacts (revision_id, edition, kind);
    CREATE INDEX artefacts_sha256 ON artefacts (sha256);
    CREATE TRIGGER artefacts_never_replaced BEFORE INSERT ON artefacts
    WHEN EXISTS (SELECT 1 FROM artefacts WHERE id = NEW.id OR (revision_id = NEW.revision_id AND edition = NEW.edition AND kind = NEW.kind))
    BEGIN SELECT RAISE(ABORT, 'an artefact of a revision is never replaced'); END;
    CREATE TRIGGER artefacts_never_change BEFORE UPDATE ON artefacts
    BEGIN SELECT RAISE(ABORT, 'an artefact of a revision never changes'); END;
    CREATE TRIGGER artefacts_never_deleted BEFORE DELETE ON artefacts
    BEGIN SELECT RAISE(ABORT, 'an artefact of a revision is never deleted'); END;

    CREATE TABLE jobs (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      kind TEXT NOT NULL CHECK (kind IN ('renderRevision')),
      revision_id INTEGER NOT NULL REFERENCES revisions (id),
      edition TEXT NOT NULL CHECK (edition IN ('draft', 'issued')),
      state TEXT NOT NULL CHECK (state IN ('queued', 'running', 'done', 'failed', 'cancelled')),
      step TEXT NOT NULL,
      done INTEGER NOT NULL,
      total INTEGER NOT NULL,
      error TEXT,
      attempts INTEGER NOT NULL,
      lease_until TEXT,
      requested_by INTEGER NOT NULL REFERENCES people (id),
      created_at TEXT NOT NULL,
      finished_at TEXT
    ) STRICT;
    CREATE INDEX jobs_revision ON jobs (revision_id);
    CREATE INDEX jobs_state ON jobs (state);
    CREATE UNIQUE INDEX jobs_open ON jobs (revision_id, edition) WHERE state IN ('queued', 'running');

    CREATE TABLE job_events (
      job_id INTEGER NOT NULL REFERENCES jobs (id) ON DELETE CASCADE,
      sequence INTEGER NOT NULL,
      payload TEXT NOT NULL CHECK (json_valid(payload)),
      created_at TEXT NOT NULL,
      PRIMARY KEY (job_id, sequence)
    ) STRICT;
  `,
}
