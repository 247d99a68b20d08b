import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { LoopAnalysis } from '#shared/types/analysis'
import { analyseInPool, closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { writeTransaction } from '#server/database/database'
import { AnalysisRow } from '#server/database/models/AnalysisRow'
import { AuditEvent } from '#server/database/models/AuditEvent'
import { SourceRow } from '#server/database/models/SourceRow'
import { UploadRow } from '#server/database/models/UploadRow'
import { analyseInputs } from '#server/services/analyses/analyseInputs'
import type { ServiceContext } from '#server/services/context'
import { replaceParameters } from '#server/services/parameters/replaceParameters'
import { createSources } from '#server/services/sources/createSources'
import { readBoard } from '#server/services/systems/readBoard'
import { removeUnusedUploads } from '#server/services/uploads/removeUnusedUploads'
import { storeUpload } from '#server/services/uploads/storeUpload'
import { buildPerson } from '../../factories/buildPerson'
import { buildCondition, buildLoop, buildSource, buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'

let close: () => Promise<void>
let context: ServiceContext
beforeAll(async () => {
  close = (await openTestDatabase()).close
  context = contextOf(await buildPerson())
})
beforeEach(() => AnalysisRow.destroy({ where: {} }))
afterAll(async () => {
  await closeAnalysisPool()
  await close()
})

describe('an analysis', () => {
  const input = { frequencyUnit: 'rad/s', numerator: [1], denominator: [1, 2, 1, 0] } as const

  it('is kept under the hash of its input, in whatever order its fields stand', async () => {
    const plain = { ...input, numerator: [...input.numerator], denominator: [...input.denominator] }
    const turned = { denominator: plain.denominator, numerator: plain.numerator, frequencyUnit: plain.frequencyUnit }
    const [first, second] = await analyseInputs([plain, turned], context)
    expect(first).toEqual(second)
    expect(await AnalysisRow.count()).toBe(1)
    const [again] = await analyseInputs([plain], context)
    expect(again).toEqual(first)
    expect(await AnalysisRow.count()).toBe(1)
  })

  it('is read from the database when it is there', async () => {
    const plain = { ...input, numerator: [1], denominator: [1, 2, 1, 0] }
    await analyseInputs([plain], context)
    const row = await AnalysisRow.findOne({ rejectOnEmpty: true })
    await writeTransaction(() => row.update({ result: { ...row.result, name: 'kept' } }))
    expect((await analyseInputs([plain], context))[0]).toMatchObject({ name: 'kept' })
  })

  it('that cannot be made says why, is not kept, and leaves the others alone', async () => {
    const results = await analyseInputs([{ numerator: [1], denominator: [0] }, { numerator: [1], denominator: [1, 0] }], context)
    expect(results).toMatchObject([{ error: { path: 'denominator' } }, { gainCrossovers: [{ frequency: 1 }] }])
    expect(await AnalysisRow.count()).toBe(1)
  })

  it('in a thread answers what is no input at all', async () => {
    expect(await analyseInPool('nonsense')).toMatchObject({ error: { path: '' } })
    expect(await analyseInPool(null)).toMatchObject({ error: { path: '' } })
  })
})

describe('the board', () => {
  it('is computed anew only where the input has changed', async () => {
    const system = await buildSystem(context)
    const condition = await buildCondition(system.id, context)
    const parameters = (wz: number, other: number) => [['wz', wz], ['other', other]].map(([name, value]) => ({ name: name as string, unit: '', notes: '', values: { [condition.id]: value as number } }))
    await replaceParameters(system.id, parameters(2, 1), context)
    const [typed, fixed, empty] = [await buildLoop(system.id, context), await buildLoop(system.id, context), await buildLoop(system.id, context)]
    await createSources(typed.id, { conditionIds: [condition.id], name: 'typed', definition: { kind: 'expression', expression: '25*(s+wz)/(s^2*(s+10))' }, ofRecord: true, setAsideReason: '' }, context)
    await buildSource(fixed.id, condition.id, context)
    const board = await readBoard(system.id, context)
    expect(board.cells.map(cell => cell.loopId)).toEqual([typed.id, fixed.id, empty.id])
    expect(board.cells.map(cell => cell.judgement.verdict === 'no data')).toEqual([false, false, true])
    expect(await AnalysisRow.count()).toBe(2)
    await replaceParameters(system.id, parameters(2, 7), context)
    await readBoard(system.id, context)
    expect(await AnalysisRow.count()).toBe(2)
    await replaceParameters(system.id, parameters(3, 7), context)
    const changed = await readBoard(system.id, context)
    expect(await AnalysisRow.count()).toBe(3)
    expect((changed.cells[0]?.analysis as LoopAnalysis).gainCrossovers).not.toEqual((board.cells[0]?.analysis as LoopAnalysis).gainCrossovers)
  })
})

describe('the sources of a loop in a condition', () => {
  it('have one of record, though many are made at once', async () => {
    const system = await buildSystem(context)
    const [loop, condition] = [await buildLoop(system.id, context), await buildCondition(system.id, context)]
    await Promise.all(Array.from({ length: 10 }, () => buildSource(loop.id, condition.id, context)))
    const sources = await SourceRow.findAll({ where: { loopId: loop.id } })
    expect(sources).toHaveLength(10)
    expect(sources.filter(source => source.ofRecord)).toHaveLength(1)
  })

  it('leave a trace in the audit, or none at all when nothing was stored', async () => {
    const system = await buildSystem(context)
    const loop = await buildLoop(system.id, context)
    const before = await AuditEvent.count({ where: { event: 'source created' } })
    await expect(buildSource(loop.id, 4711, context)).rejects.toMatchObject({ path: 'conditionIds[0]' })
    expect(await AuditEvent.count({ where: { event: 'source created' } })).toBe(before)
    const condition = await buildCondition(system.id, context)
    const source = await buildSource(loop.id, condition.id, context)
    expect(await AuditEvent.findOne({ where: { event: 'source created' }, order: [['id', 'DESC']] })).toMatchObject({ personId: context.actor.id, systemId: system.id, subjectId: String(source.id) })
  })
})

describe('an uploaded file', () => {
  it('is removed after a day unless a source has come to use it', async () => {
    const system = await buildSystem(context)
    const [loop, condition] = [await buildLoop(system.id, context), await buildCondition(system.id, context)]
    const store = (name: string, time: string) => storeUpload(system.id, { name, bytes: Buffer.from('f,re,im\n1,1,-1\n2,0.5,-1\n4,0.1,-0.5\n') }, contextOf(context.actor, time))
    const used = await store('used.csv', '2026-11-20T00:00:00Z')
    const old = await store('old.csv', '2026-11-20T00:00:00Z')
    const young = await store('young.csv', '2026-11-30T12:00:00Z')
    const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'real and imaginary', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' } as const
    await buildSource(loop.id, condition.id, context, { kind: 'measured', uploadId: used.id, mapping })
    expect(await removeUnusedUploads(() => new Date('2026-12-01T00:00:00Z'))).toBe(1)
    expect((await UploadRow.findAll()).map(upload => upload.id).sort()).toEqual([used.id, young.id].sort())
    expect(await UploadRow.findByPk(old.id)).toBeNull()
  })
})
