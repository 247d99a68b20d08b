import { createHash } from 'node:crypto'
import { mkdir } from 'node:fs/promises'
import { dirname } from 'node:path'
import sqlite3 from 'sqlite3'
import { Umzug } from 'umzug'
import type { Migration } from './Migration'
import { configuredSqlite } from './configuredSqlite'

type Connection = sqlite3.Database

const connect = (file: string) => new Promise<Connection>((resolve, reject) => {
  const connection: Connection = new configuredSqlite.Database(file, sqlite3.OPEN_READWRITE | sqlite3.OPEN_CREATE, error => error ? reject(error) : resolve(connection))
})
const execute = (connection: Connection, sql: string) => new Promise<void>((resolve, reject) => {
  connection.exec(sql, error => error ? reject(error) : resolve())
})
const select = <Row>(connection: Connection, sql: string) => new Promise<Row[]>((resolve, reject) => {
  connection.all<Row>(sql, (error, rows) => error ? reject(error) : resolve(rows))
})
const run = (connection: Connection, sql: string, values: unknown[]) => new Promise<void>((resolve, reject) => {
  connection.run(sql, values, error => error ? reject(error) : resolve())
})
const close = (connection: Connection) => new Promise<void>((resolve, reject) => {
  connection.close(error => error ? reject(error) : resolve())
})

const checksumOf = (migration: Migration) => createHash('sha256').update(migration.sql).digest('hex')

/** Runs one migration and notes it as done, both or neither. */
async function apply(connection: Connection, migration: Migration): Promise<void> {
  // Dropping a table others point at would run their cascades; the check before the commit stands in for the keys.
  await execute(connection, 'PRAGMA foreign_keys = OFF')
  await execute(connection, 'BEGIN IMMEDIATE')
  try {
    await execute(connection, migration.sql)
    const broken = await select<{ table: string }>(connection, 'PRAGMA foreign_key_check')
    if (broken.length > 0) throw new Error(`Migration ${migration.name} leaves rows of ${broken[0]?.table} that point at nothing.`)
    await run(connection, 'INSERT INTO migrations (name, checksum, applied_at) VALUES (?, ?, ?)', [migration.name, checksumOf(migration), new Date().toISOString()])
    await execute(connection, 'COMMIT')
  }
  catch (error) {
    await execute(connection, 'ROLLBACK')
    throw error
  }
  finally {
    await execute(connection, 'PRAGMA foreign_keys = ON')
  }
}

/**
 * Brings the database file to the newest schema, creating it if there is none, and returns the names of the migrations that ran.
 * Throws where an applied migration differs from the one in the program, or is not in it: such a file belongs to another version.
 */
export async function migrateDatabase(file: string, migrations: readonly Migration[]): Promise<string[]> {
  await mkdir(dirname(file), { recursive: true })
  const connection = await connect(file)
  try {
    await execute(connection, 'CREATE TABLE IF NOT EXISTS migrations (name TEXT NOT NULL PRIMARY KEY, checksum TEXT NOT NULL, applied_at TEXT NOT NULL) STRICT')
    const applied = await select<{ name: string, checksum: string }>(connection, 'SELECT name, checksum FROM migrations ORDER BY name')
    for (const { name, checksum } of applied) {
      const known = migrations.find(migration => migration.name === name)
      if (!known) throw new Error(`The database ${file} was made by a newer version: it has the migration ${name}, which this version does not know.`)
      if (checksumOf(known) !== checksum) throw new Error(`The database ${file} was made by another version: its migration ${name} differs from this version's.`)
    }
    const umzug = new Umzug({
      migrations: migrations.map(migration => ({ name: migration.name, up: () => apply(connection, migration) })),
      storage: {
        // The note is made by `apply` in the migration's own transaction.
        logMigration: async () => {},
        unlogMigration: async ({ name }) => {
          throw new Error(`Migration ${name} cannot be undone: restore a copy of the database instead.`)
        },
        executed: async () => (await select<{ name: string }>(connection, 'SELECT name FROM migrations ORDER BY name')).map(row => row.name),
      },
      logger: undefined,
    })
    return (await umzug.up()).map(migration => migration.name)
  }
  finally {
    await close(connection)
  }
}
