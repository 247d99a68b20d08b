import type { Migration } from '../Migration'

/** The team's brand, the people with their sessions and link tokens, and the mails sent to them. */
export const organisationAndPeople: Migration = {
  name: '20261201-01-organisation-and-people',
  sql: `
    CREATE TABLE organisation (
      id INTEGER PRIMARY KEY CHECK (id = 1),
      team_name TEXT NOT NULL,
      accent TEXT NOT NULL CHECK (accent GLOB '#[0-9A-Fa-f][0-9A-Fa-f][0-9A-Fa-f][0-9A-Fa-f][0-9A-Fa-f][0-9A-Fa-f]'),
      address_line TEXT NOT NULL,
      page_size TEXT NOT NULL CHECK (page_size IN ('A4', 'Letter')),
      version INTEGER NOT NULL
    ) STRICT;
    INSERT INTO organisation (id, team_name, accent, address_line, page_size, version) VALUES (1, 'Loop analysis team', '#0C5A7D', '', 'A4', 1);

    CREATE TABLE marks (
      id INTEGER PRIMARY KEY CHECK (id = 1),
      media_type TEXT NOT NULL,
      bytes BLOB NOT NULL,
      sha256 TEXT NOT NULL
    ) STRICT;

    CREATE TABLE people (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      email TEXT NOT NULL COLLATE NOCASE,
      name TEXT NOT NULL,
      password_hash TEXT,
      is_administrator INTEGER NOT NULL DEFAULT 0 CHECK (is_administrator IN (0, 1)),
      disabled_at TEXT,
      created_at TEXT NOT NULL
    ) STRICT;
    CREATE UNIQUE INDEX people_email ON people (email);

    CREATE TABLE sessions (
      id_hash TEXT NOT NULL PRIMARY KEY,
      person_id INTEGER NOT NULL REFERENCES people (id),
      created_at TEXT NOT NULL,
      last_seen_at TEXT NOT NULL,
      expires_at TEXT NOT NULL
    ) STRICT;
    -- a new password and a disabled account end every session of a person
    CREATE INDEX sessions_person ON sessions (person_id);

    CREATE TABLE person_tokens (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      person_id INTEGER NOT NULL REFERENCES people (id),
      purpose TEXT NOT NULL CHECK (purpose IN ('invitation', 'reset')),
      token_hash TEXT NOT NULL,
      created_at TEXT NOT NULL,
      expires_at TEXT NOT NULL,
      used_at TEXT
    ) STRICT;
    CREATE UNIQUE INDEX person_tokens_token_hash ON person_tokens (token_hash);
    CREATE INDEX person_tokens_person ON person_tokens (person_id);

    CREATE TABLE outbox_mails (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      to_name TEXT NOT NULL,
      to_address TEXT NOT NULL,
      subject TEXT NOT NULL,
      text TEXT NOT NULL,
      created_at TEXT NOT NULL,
      sent_at TEXT,
      attempts INTEGER NOT NULL DEFAULT 0,
      error TEXT
    ) STRICT;
  `,
}
