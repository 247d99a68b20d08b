import { QueryTypes } from 'sequelize'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { database, writeTransaction } from '#server/database/database'
import { CriterionRow } from '#server/database/models/CriterionRow'
import { SystemRow } from '#server/database/models/SystemRow'
import { openTestDatabase } from '../../factories/openTestDatabase'

let close: () => Promise<void>
let systemId = 0
beforeAll(async () => {
  close = (await openTestDatabase()).close
})
beforeEach(async () => {
  const system = await SystemRow.create({ name: 'S', customer: '', documentNumber: '', frequencyUnit: 'Hz', description: '', version: 0, createdAt: '2026-12-01T00:00:00.000Z' })
  systemId = system.id
})
afterAll(() => close())

const pragma = async (name: string) => Object.values((await database().query<Record<string, unknown>>(`PRAGMA ${name}`, { type: QueryTypes.SELECT }))[0] ?? {})[0]

describe('a connection', () => {
  it.each([['outside a transaction', <T>(work: () => Promise<T>) => work()], ['inside one', writeTransaction]])('%s has a write-ahead log, full synchronisation, foreign keys and patience', async (_, around) => {
    await around(async () => {
      expect(await pragma('journal_mode')).toBe('wal')
      expect(await pragma('synchronous')).toBe(2)
      expect(await pragma('foreign_keys')).toBe(1)
      expect(await pragma('busy_timeout')).toBe(5000)
    })
  })
})

describe('a write transaction', () => {
  it('loses no update though 60 read, think and write at once', async () => {
    await Promise.all(Array.from({ length: 60 }, () => writeTransaction(async () => {
      const row = await SystemRow.findByPk(systemId, { rejectOnEmpty: true })
      await row.update({ version: row.version + 1 })
    })))
    expect((await SystemRow.findByPk(systemId, { rejectOnEmpty: true })).version).toBe(60)
  })

  it('takes queries along that do not name it, and undoes them all when it fails', async () => {
    await expect(writeTransaction(async () => {
      await SystemRow.update({ name: 'half done' }, { where: { id: systemId } })
      await CriterionRow.create({ systemId, quantity: 'gainMargin', limitValue: 6 })
      throw new Error('cut')
    })).rejects.toThrow('cut')
    expect((await SystemRow.findByPk(systemId, { rejectOnEmpty: true })).name).toBe('S')
    expect(await CriterionRow.count({ where: { systemId } })).toBe(0)
  })

  it('joins the one it is called in', async () => {
    await expect(writeTransaction(async () => {
      await writeTransaction(() => SystemRow.update({ name: 'inner' }, { where: { id: systemId } }))
      throw new Error('cut')
    })).rejects.toThrow('cut')
    expect((await SystemRow.findByPk(systemId, { rejectOnEmpty: true })).name).toBe('S')
  })

  it('does not reach into work started by another one that waited behind it', async () => {
    const seen: string[] = []
    await Promise.all([
      writeTransaction(() => SystemRow.update({ name: 'first' }, { where: { id: systemId } })),
      writeTransaction(async () => {
        seen.push((await SystemRow.findByPk(systemId, { rejectOnEmpty: true })).name)
      }),
    ])
    expect(seen).toEqual(['first'])
  })
})
