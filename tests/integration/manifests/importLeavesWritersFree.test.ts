import { afterAll, beforeAll, beforeEach, expect, it, vi } from 'vitest'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { SystemRow } from '#server/database/models/SystemRow'
import { transactionContext } from '#server/database/transactionContext'
import type { ServiceContext } from '#server/services/context'
import { importManifest } from '#server/services/manifests/importManifest'
import { buildPerson } from '../../factories/buildPerson'
import { buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { manifestExample } from '../../factories/manifestExample'
import { openTestDatabase } from '../../factories/openTestDatabase'

/** What is done while the engine is asked, and whether a transaction was open then. */
const asked = vi.hoisted(() => ({ transactions: [] as unknown[], meanwhile: async (): Promise<unknown> => undefined }))
vi.mock('#server/adapters/analysisPool/analysisPool', async (load) => {
  const pool = await load<typeof import('#server/adapters/analysisPool/analysisPool')>()
  return {
    ...pool,
    runInPool: async (...question: Parameters<typeof pool.runInPool>) => {
      asked.transactions.push(transactionContext.get('transaction'))
      await asked.meanwhile()
      return pool.runInPool(...question)
    },
  }
})

let context: ServiceContext
let close: () => Promise<void>
beforeAll(async () => {
  close = (await openTestDatabase()).close
  context = contextOf(await buildPerson())
})
afterAll(async () => {
  await closeAnalysisPool()
  await close()
})
beforeEach(() => {
  asked.transactions = []
})

it('Importing a manifest asks the engine, once a build, with no transaction open, and no half of the system is seen meanwhile', async () => {
  const seen: string[][] = []
  asked.meanwhile = async () => seen.push((await SystemRow.findAll()).map(({ name }) => name))
  await importManifest(await manifestExample(), context)
  expect(asked.transactions).toEqual([undefined, undefined])
  expect(seen).toEqual([[], []])
  expect(await SystemRow.count()).toBe(1)
})

it('What others store while the engine is asked stays, though the manifest is refused', async () => {
  asked.meanwhile = async () => {
    asked.meanwhile = async () => undefined
    await buildSystem(context, { name: 'Made meanwhile' })
  }
  const before = await SystemRow.count()
  const sampled = (await manifestExample()).replace('"kind": "deadTime",\n        "deadTime": 0.004,\n        "unit": "s"', '"kind": "expression", "expression": "1/z", "sampleTime": 0.004')
  await expect(importManifest(sampled, context)).rejects.toMatchObject({ code: 'invalidInput', path: 'loops[0].sources[0].definition.expression' })
  expect(await SystemRow.count()).toBe(before + 1)
})
