import { QueryTypes } from 'sequelize'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { database } from '#server/database/database'
import { openTestDatabase } from '../../factories/openTestDatabase'

let close: () => Promise<void>
beforeAll(async () => {
  close = (await openTestDatabase()).close
})
afterAll(() => close())

const select = <Row extends object>(sql: string) => database().query<Row>(sql, { type: QueryTypes.SELECT })
const kindOfType: Record<string, string> = { INTEGER: 'INTEGER', TINYINT: 'INTEGER', TEXT: 'TEXT', DOUBLE: 'REAL', BLOB: 'BLOB' }

interface ModelIndex { name: string, unique?: boolean, fields: string[], where?: object }

describe('models and migrations', () => {
  it('name the same tables', async () => {
    const tables = await select<{ name: string }>('SELECT name FROM sqlite_master WHERE type = \'table\' AND name NOT LIKE \'sqlite_%\' AND name <> \'migrations\'')
    const modelled = Object.values(database().models).map(model => model.getTableName())
    expect(tables.map(table => table.name).sort()).toEqual(modelled.sort())
  })

  it('give each table the same columns, with the same types, keys and nullability', async () => {
    for (const model of Object.values(database().models)) {
      const table = model.getTableName() as string
      const columns = await select<{ name: string, type: string, notnull: number, pk: number }>(`PRAGMA table_info(${table})`)
      const stored = columns.map(column => ({ name: column.name, type: column.type, nullable: column.notnull === 0 && column.pk === 0, key: column.pk > 0 }))
      const modelled = Object.values(model.getAttributes()).map(attribute => ({
        name: attribute.field,
        type: kindOfType[String((attribute.type as { key: string }).key === 'BOOLEAN' ? 'TINYINT' : (attribute.type as { key: string }).key).replace('DOUBLE PRECISION', 'DOUBLE')],
        nullable: attribute.allowNull !== false,
        key: attribute.primaryKey === true,
      }))
      expect({ table, columns: modelled }).toEqual({ table, columns: stored })
    }
  })

  it('give each table the same indexes', async () => {
    for (const model of Object.values(database().models)) {
      const table = model.getTableName() as string
      const indexes = await select<{ name: string, unique: number, partial: number, origin: string }>(`PRAGMA index_list(${table})`)
      const stored = await Promise.all(indexes.filter(index => index.origin === 'c').map(async index => ({
        name: index.name,
        unique: index.unique === 1,
        partial: index.partial === 1,
        fields: (await select<{ name: string }>(`PRAGMA index_info(${index.name})`)).map(column => column.name),
      })))
      const modelled = ((model.options.indexes ?? []) as ModelIndex[]).map(index => ({
        name: index.name, unique: index.unique === true, partial: index.where !== undefined, fields: index.fields,
      }))
      const byName = (a: { name: string }, b: { name: string }) => a.name.localeCompare(b.name)
      expect({ table, indexes: modelled.sort(byName) }).toEqual({ table, indexes: stored.sort(byName) })
    }
  })

  it('leave no foreign key without an index that begins with it', async () => {
    const bare: string[] = []
    for (const model of Object.values(database().models)) {
      const table = model.getTableName() as string
      const keys = await select<{ from: string }>(`PRAGMA foreign_key_list(${table})`)
      const indexes = await select<{ name: string }>(`PRAGMA index_list(${table})`)
      const firsts = await Promise.all(indexes.map(async index => (await select<{ name: string }>(`PRAGMA index_info(${index.name})`))[0]?.name))
      // who did it is never searched by, and people are never deleted
      bare.push(...keys.map(key => key.from).filter(column => !firsts.includes(column) && !/_by$|person_id$/.test(column)).map(column => `${table}.${column}`))
    }
    expect(bare).toEqual([])
  })
})
