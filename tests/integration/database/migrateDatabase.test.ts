import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { migrateDatabase } from '#server/database/migrateDatabase'
import { migrations } from '#server/database/migrations/migrations'

let folder = ''
let file = ''
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'wideberth-'))
  file = join(folder, 'deeper', 'wideberth.sqlite')
})
afterEach(() => rm(folder, { recursive: true }))

describe('migrateDatabase', () => {
  it('makes the folder and runs every migration once', async () => {
    expect(await migrateDatabase(file, migrations)).toEqual(migrations.map(migration => migration.name))
    expect(await migrateDatabase(file, migrations)).toEqual([])
  })

  it('leaves nothing behind of a migration that fails, and runs it once it is mended', async () => {
    const half = { name: '01', sql: 'CREATE TABLE a (x INTEGER) STRICT; INSERT INTO nowhere VALUES (1);' }
    await expect(migrateDatabase(file, [half])).rejects.toThrow('nowhere')
    expect(await migrateDatabase(file, [{ name: '01', sql: 'CREATE TABLE a (x INTEGER) STRICT;' }])).toEqual(['01'])
  })

  it('refuses a migration that leaves rows pointing at nothing', async () => {
    const dangling = { name: '01', sql: 'CREATE TABLE a (id INTEGER PRIMARY KEY) STRICT; CREATE TABLE b (a INTEGER REFERENCES a (id)) STRICT; INSERT INTO b VALUES (7);' }
    await expect(migrateDatabase(file, [dangling])).rejects.toThrow('leaves rows of b that point at nothing')
  })

  it('refuses a database of a newer version, and one whose migrations were different', async () => {
    await migrateDatabase(file, [{ name: '01', sql: 'CREATE TABLE a (x INTEGER) STRICT;' }])
    await expect(migrateDatabase(file, [])).rejects.toThrow('made by a newer version')
    await expect(migrateDatabase(file, [{ name: '01', sql: 'CREATE TABLE a (x TEXT) STRICT;' }])).rejects.toThrow('differs from this version')
  })
})
