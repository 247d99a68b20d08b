import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SourceDefinition } from '#shared/types/source'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { closeDatabase, database, openDatabase } from '#server/database/database'
import { migrateDatabase } from '#server/database/migrateDatabase'
import { migrations } from '#server/database/migrations/migrations'
import { exportManifest } from '#server/services/manifests/exportManifest'
import { importManifest } from '#server/services/manifests/importManifest'
import { updateLoop } from '#server/services/loops/updateLoop'
import { readBoard } from '#server/services/systems/readBoard'
import { buildBlock, typed } from '../../factories/buildBlock'
import { contextOf } from '../../factories/contextOf'
import { sixDecibelLoop } from '../../factories/buildSystem'

const now = '2026-12-01T12:00:00.000Z'
const context = contextOf({ id: 1, email: 'ada@example.org', name: 'Ada', isAdministrator: false })
const sql = (statement: string, replacements: unknown[] = []) => database().query(statement, { replacements })
/** As the engine of that version answered: without what later ones find. */
const oldAnswer = '{"engineVersion":"1.0.0"}'

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'wideberth-'))
  const file = join(folder, 'wideberth.sqlite')
  const before = migrations.filter(({ name }) => name < '20261201-06')
  await migrateDatabase(file, before)
  openDatabase(file)
  const definition: SourceDefinition = sixDecibelLoop
  await sql('INSERT INTO people (id, email, name, created_at) VALUES (1, \'ada@example.org\', \'Ada\', ?)', [now])
  await sql('INSERT INTO systems (id, name, customer, document_number, frequency_unit, description, version, created_at) VALUES (1, \'Old\', \'C\', \'D\', \'rad/s\', \'\', 3, ?)', [now])
  for (const id of [1, 2]) await sql('INSERT INTO loops (id, system_id, code, name, axis, break_point, other_loops, notes, position, version, created_at, deleted_at) VALUES (?, 1, ?, \'Loop\', \'x\', \'torque\', \'all closed\', \'\', ?, 1, ?, ?)', [id, `L${id}`, id, now, id === 2 ? now : null])
  await sql('INSERT INTO operating_conditions (id, system_id, code, name, coordinates, tags, notes, position, version, created_at) VALUES (1, 1, \'C1\', \'One\', \'[]\', \'[]\', \'\', 1, 1, ?)', [now])
  await sql('INSERT INTO sources (loop_id, condition_id, name, kind, definition, of_record, set_aside_reason, version, created_at) VALUES (1, 1, \'model\', ?, ?, 1, \'\', 1, ?)', [definition.kind, JSON.stringify(definition), now])
  await sql('INSERT INTO analyses (input_hash, engine_version, result, created_at) VALUES (\'h\', \'1.0.0\', ?, ?)', [oldAnswer, now])
  await closeDatabase()
  expect(await migrateDatabase(file, migrations)).toEqual(migrations.slice(before.length).map(({ name }) => name))
  openDatabase(file)
})
afterAll(async () => {
  await closeAnalysisPool()
  await closeDatabase()
  await rm(folder, { recursive: true })
})

describe('a database of the version before there were blocks', () => {
  it('has its loops opened at no block, the others at nominal, analysed anew', async () => {
    const { loops, cells } = await readBoard(1, context)
    expect(loops).toMatchObject([{ code: 'L1', breakPoint: 'torque', otherLoops: 'all closed', breakAt: null, loopStates: [] }])
    expect(cells).toMatchObject([{ failure: null, disagreement: null, analysis: { stability: { verdict: expect.any(String) as string } } }])
    expect(await sql('SELECT result FROM analyses WHERE input_hash = \'h\'')).toMatchObject([[{ result: oldAnswer }], {}])
  })

  it('takes blocks, break points and states, and goes out and in as a manifest', async () => {
    await buildBlock(1, context, 'G', typed('1/s'))
    expect(await updateLoop(1, { version: 1, breakAt: { block: 'G', side: 'input' }, loopStates: [{ loopId: 2, state: 'open' }] }, context)).toMatchObject({ breakAt: { block: 'G' } })
    const { text } = await exportManifest(1)
    expect((await exportManifest((await importManifest(text, context)).id)).text).toBe(text)
  })
})
