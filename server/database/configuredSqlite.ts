import sqlite3 from 'sqlite3'

/**
 * What every connection is given before its first statement. Sequelize opens a new connection for each transaction and
 * sends it nothing but foreign keys, so the rest must be set here. WAL with FULL keeps a commit through a power cut.
 */
const connectionPragmas = `
  PRAGMA journal_mode = WAL;
  PRAGMA synchronous = FULL;
  PRAGMA foreign_keys = ON;
  PRAGMA temp_store = MEMORY;
`

/** ms; how long a connection waits for another's write */
const busyTimeout = 5000

class ConfiguredDatabase extends sqlite3.Database {
  constructor(file: string, mode: number, callback: (error: Error | null) => void) {
    super(file, mode, (error) => {
      if (error) return callback(error)
      this.configure('busyTimeout', busyTimeout)
      this.exec(connectionPragmas, failure => callback(failure))
    })
  }
}

/** The sqlite3 driver with our connection settings, handed to Sequelize as its dialect module. */
export const configuredSqlite = Object.assign(Object.create(sqlite3) as typeof sqlite3, { Database: ConfiguredDatabase })
