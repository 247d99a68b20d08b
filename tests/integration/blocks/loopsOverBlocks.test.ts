import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { ExpressionInput } from '#shared/types/analysis'
import type { BlockDefinition } from '#shared/types/block'
import type { Source } from '#shared/types/source'
import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { AnalysisRow } from '#server/database/models/AnalysisRow'
import { listBlocks } from '#server/services/blocks/listBlocks'
import { readGains } from '#server/services/blocks/readGains'
import { readBlockEffects } from '#server/services/blocks/readBlockEffects'
import { updateBlock } from '#server/services/blocks/updateBlock'
import type { ServiceContext } from '#server/services/context'
import { readLoop } from '#server/services/loops/readLoop'
import { updateLoop } from '#server/services/loops/updateLoop'
import { replaceParameters } from '#server/services/parameters/replaceParameters'
import { createReport } from '#server/services/reports/createReport'
import { freezeRevision } from '#server/services/revisions/freezeRevision'
import { compareLoopSources } from '#server/services/sources/compareLoopSources'
import { createSources } from '#server/services/sources/createSources'
import { readSource } from '#server/services/sources/readSource'
import { readBoard } from '#server/services/systems/readBoard'
import { storeUpload } from '#server/services/uploads/storeUpload'
import { buildBlock, typed } from '../../factories/buildBlock'
import { buildPerson } from '../../factories/buildPerson'
import { buildCondition, buildLoop, buildSource, buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'

let context: ServiceContext
let close: () => Promise<void>
let system: System
let c1: OperatingCondition
let c2: OperatingCondition
let loop: Loop
const over = (expression: string) => ({ kind: 'expression', expression }) as const
const inputOf = async (source: Source) => (await readSource(source.id, context)).input as ExpressionInput
const gainMarginOf = async (source: Source) => (await readSource(source.id, context)).analysis?.summary?.gainIncrease

beforeAll(async () => {
  close = (await openTestDatabase()).close
  context = contextOf(await buildPerson())
})
afterAll(() => close())
beforeEach(async () => {
  system = await buildSystem(context)
  c1 = await buildCondition(system.id, context, { code: 'C1' })
  c2 = await buildCondition(system.id, context, { code: 'C2' })
  loop = await buildLoop(system.id, context, { code: 'SL-P' })
  const values = { [c1.id]: 1, [c2.id]: 1 }
  await replaceParameters(system.id, ['k', 'w', 'idle'].map(name => ({ name, unit: '', notes: '', values })), context)
})

describe('a source over blocks', () => {
  // L = k / (s (s + 1)^2): |L| at w = 1, where its phase is -180 deg, is k/2, so the gain margin is 20 log10(2/k). Closed form, derived here.
  const decibels = (k: number) => 20 * Math.log10(2 / k)
  beforeEach(async () => {
    await buildBlock(system.id, context, 'C', typed('k'))
    await buildBlock(system.id, context, 'P', typed('1/(s*(s+w)^2)'), { byCondition: { [c2.id]: { kind: 'zerosPoles', zeros: [], poles: [[0, 0], [-1, 0], [-1, 0]], gain: 0.5 } } })
    await buildBlock(system.id, context, 'other', typed('idle'))
  })

  it('has in each condition the block\'s gain there, or the one of all conditions', async () => {
    const [first, second] = [await buildSource(loop.id, c1.id, context, over('C*P')), await buildSource(loop.id, c2.id, context, over('C*P'))]
    expect(await gainMarginOf(first)).toBeCloseTo(decibels(1), 9)
    expect(await gainMarginOf(second)).toBeCloseTo(decibels(0.5), 9)
  })

  it('hands the engine just the blocks and parameters it needs, so that another change leaves its analysis', async () => {
    const source = await buildSource(loop.id, c1.id, context, over('C*P'))
    expect(await inputOf(source)).toEqual({ frequencyUnit: 'rad/s', expression: 'C*P', parameters: { k: 1, w: 1 }, blocks: { C: typed('k'), P: typed('1/(s*(s+w)^2)') } })
  })

  it('says, where a block has no gain in the condition, which and where', async () => {
    await buildBlock(system.id, context, 'G', null, { byCondition: { [c1.id]: typed('1/s') } })
    const source = await buildSource(loop.id, c2.id, context, over('C*G/(s+1)^2'))
    expect(await readSource(source.id, context)).toMatchObject({ analysis: null, failure: { message: 'The block G has no gain in the condition C2.', path: 'blocks.G' } })
  })

  it('says, where a parameter of a block has no value in the condition, which and where', async () => {
    await replaceParameters(system.id, [{ name: 'k', unit: '', notes: '', values: { [c1.id]: 1 } }, { name: 'w', unit: '', notes: '', values: {} }, { name: 'idle', unit: '', notes: '', values: {} }], context)
    const source = await buildSource(loop.id, c1.id, context, over('C*P'))
    expect(await readSource(source.id, context)).toMatchObject({ failure: { message: 'The parameter w has no value in the condition C1.', path: 'parameters.w' } })
  })

  it('has the set of its condition from a file of stacked matrices', async () => {
    // companion form of gain / (s (s + 1)^2), as rows A, B, C, D
    const set = (name: string, gain: number) => `condition, ${name}\nA\n0,1,0\n0,0,1\n0,-1,-2\nB\n0\n0\n${gain}\nC\n1,0,0\nD\n0\n`
    const upload = await storeUpload(system.id, { name: 'plant.csv', bytes: Buffer.from(set('C1', 1) + set('C2', 0.25)) }, context)
    const matrices = (name: string): BlockDefinition => ({ kind: 'stateSpace', uploadId: upload.id, set: name, states: null, inputs: [], outputs: ['angle'] })
    await buildBlock(system.id, context, 'G', null, { byCondition: { [c1.id]: matrices('C1'), [c2.id]: matrices('C2') } })
    const [first, second] = await createSources(loop.id, { conditionIds: [c1.id, c2.id], name: 'matrices', definition: over('C*G[angle,1]'), ofRecord: true, setAsideReason: '' }, context) as [Source, Source]
    expect(await gainMarginOf(first)).toBeCloseTo(decibels(1), 9)
    expect(await gainMarginOf(second)).toBeCloseTo(decibels(0.25), 9)
  })

  it.each([
    ['an unknown name', 'C*Q', 2],
    ['a block called like a function', 'C(P)', 0],
    ['an ending in the middle', 'C*P*', 3],
  ])('is refused with %s at its character, and nothing is stored', async (_, expression, position) => {
    await expect(buildSource(loop.id, c1.id, context, over(expression))).rejects.toMatchObject({ code: 'invalidInput', path: 'definition.expression', details: { position } })
    expect((await readLoop(loop.id, context)).sources).toEqual([])
  })

  it('is refused where sampled and continuous blocks meet without a hold, two rates meet, or the loop has no solution', async () => {
    await buildBlock(system.id, context, 'D', typed('0.1*z/(z-1)', 0.001))
    await buildBlock(system.id, context, 'E', typed('1/(z-0.5)', 0.002))
    await buildBlock(system.id, context, 'one', typed('-1'))
    for (const expression of ['D*P', 'D*E', 'C*P/(1+one)']) {
      await expect(buildSource(loop.id, c1.id, context, over(expression))).rejects.toMatchObject({ code: 'invalidInput', path: 'definition.expression', details: { position: expect.any(Number) as number } })
    }
    await expect(buildSource(loop.id, c1.id, context, { ...over('C*D'), deadTime: 0.0105 })).rejects.toMatchObject({ code: 'invalidInput', path: expect.stringMatching(/^definition\.(?:expression|deadTime)$/) as string })
    expect((await readLoop(loop.id, context)).sources).toEqual([])
  })

  it('is shown with all blocks; their gains are read for one condition, for the engine in the browser', async () => {
    await buildBlock(system.id, context, 'G', null, { byCondition: { [c1.id]: { kind: 'sections', rows: [['1', '0', '0', '2/4', '0', '0']], gain: '1', sampleTime: 0.001 } } })
    const { blocks } = await readLoop(loop.id, context)
    const [inC1, inC2] = [await readGains(c1.id), await readGains(c2.id)]
    expect(blocks.map(block => block.name)).toEqual(['C', 'P', 'other', 'G'])
    expect(Object.keys(inC1)).toEqual(['C', 'P', 'other', 'G'])
    expect(inC1.G).toEqual({ kind: 'sections', sections: [[1, 0, 0, 0.5, 0, 0]], gain: 1, sampleTime: 0.001 })
    expect(inC2.G).toBeUndefined()
  })
})

describe('what a drafted block would do', () => {
  let rate: Loop
  beforeEach(async () => {
    rate = await buildLoop(system.id, context, { code: 'SL-R' })
    await buildBlock(system.id, context, 'F', typed('1'))
    await buildBlock(system.id, context, 'P', typed('F/(s*(s+1)^2)'))
    await buildSource(loop.id, c1.id, context, over('P'))
    await buildSource(loop.id, c2.id, context, over('P'))
    await buildSource(rate.id, c1.id, context, over('0.5/(s*(s+1)^2)'))
  })
  const draftOf = async (change: object) => {
    const stored = (await listBlocks(system.id)).find(block => block.name === 'F')
    return { blockId: stored?.id ?? null, name: 'F', role: 'filter' as const, definition: typed('1'), byCondition: {}, ...change }
  }

  it('is told of every loop and condition that needs it, also by another block, and of no other', async () => {
    const effects = await readBlockEffects(system.id, await draftOf({ byCondition: { [c2.id]: typed('0.5') } }), context)
    expect(effects.map(({ loopId, conditionId, moved }) => ({ loopId, conditionId, moved }))).toEqual([{ loopId: loop.id, conditionId: c1.id, moved: false }, { loopId: loop.id, conditionId: c2.id, moved: true }])
    expect(effects[1]?.before?.summary?.gainIncrease).toBeCloseTo(6.0206, 4)
    expect(effects[1]?.after?.summary?.gainIncrease).toBeCloseTo(12.0412, 4)
    expect(effects[1]).toMatchObject({ before: { verdict: 'stable', failure: null, judgement: { verdict: expect.any(String) as string } } })
  })

  it('is no move where the same gain is typed in another way', async () => {
    const effects = await readBlockEffects(system.id, await draftOf({ definition: { kind: 'coefficients', numerator: [2], denominator: [2] } }), context)
    expect(effects.map(effect => effect.moved)).toEqual([false, false])
  })

  it('may be that a loop has no analysis any more, with the reason', async () => {
    const effects = await readBlockEffects(system.id, await draftOf({ definition: null, byCondition: { [c1.id]: typed('1') } }), context)
    expect(effects[1]).toMatchObject({ moved: true, after: { failure: 'The block F has no gain in the condition C2.', summary: null } })
  })

  it('stores nothing: neither the block nor the analyses of the draft', async () => {
    await readBoard(system.id, context)
    const [blocks, analyses] = [await listBlocks(system.id), await AnalysisRow.count()]
    await readBlockEffects(system.id, await draftOf({ definition: typed('0.123') }), context)
    expect(await listBlocks(system.id)).toEqual(blocks)
    expect(await AnalysisRow.count()).toBe(analyses)
  })

  it('is refused at the place of the fault where the draft cannot be read', async () => {
    await expect(readBlockEffects(system.id, await draftOf({ definition: typed('P') }), context)).rejects.toMatchObject({ code: 'invalidInput', path: 'definition.expression' })
    await expect(readBlockEffects(system.id, await draftOf({ definition: typed('1/(s+') }), context)).rejects.toMatchObject({ path: 'definition.expression', details: { position: expect.any(Number) as number } })
  })

  it('of a new block is nothing, since nobody can name it yet; its name must be free', async () => {
    expect(await readBlockEffects(system.id, await draftOf({ blockId: null, name: 'N', definition: typed('2') }), context)).toEqual([])
    await expect(readBlockEffects(system.id, await draftOf({ blockId: null }), context)).rejects.toMatchObject({ code: 'conflict', path: 'name' })
    const [parameter] = await replaceParameters(system.id, [{ name: 'kN', unit: '', notes: '', values: {} }], context)
    await expect(readBlockEffects(system.id, await draftOf({ blockId: null, name: parameter?.name ?? '', definition: typed('2') }), context)).rejects.toMatchObject({ code: 'conflict', path: 'name' })
  })

  it('counts as the stored name where the draft has another', async () => {
    expect(await readBlockEffects(system.id, await draftOf({ name: 'Filter', definition: typed('0.5') }), context)).toMatchObject([{ moved: true }, { moved: true }])
  })

  it('comes true when it is stored', async () => {
    const [effect] = await readBlockEffects(system.id, await draftOf({ definition: typed('0.25') }), context)
    const stored = (await listBlocks(system.id)).find(block => block.name === 'F')
    await updateBlock(stored?.id ?? 0, { version: 1, definition: typed('0.25') }, context)
    const cell = (await readBoard(system.id, context)).cells.find(({ loopId, conditionId }) => loopId === loop.id && conditionId === c1.id)
    expect(cell?.analysis?.summary).toEqual(effect?.after?.summary)
  })
})

describe('the sources of a loop in a condition', () => {
  it('are told with how far each lies from the one of record', async () => {
    await buildBlock(system.id, context, 'P', typed('1/(s*(s+1)^2)'))
    const model = await buildSource(loop.id, c1.id, context, over('P'))
    const [louder] = await createSources(loop.id, { conditionIds: [c1.id], name: 'louder', definition: over('2*P'), ofRecord: false, setAsideReason: 'the gain was wrong' }, context) as [Source]
    await buildSource(loop.id, c2.id, context, over('P'))
    const { sources, differences } = await compareLoopSources(loop.id, c1.id, context)
    expect(sources.map(({ source }) => source.id)).toEqual([model.id, louder.id])
    expect(differences).toHaveLength(1)
    expect(differences[0]).toMatchObject({ reference: model.name, other: 'louder', reason: null })
    // twice the gain is 6.0206 dB more at every frequency, and no lag
    for (const { gain, phase } of differences[0]?.bands ?? []) {
      expect(gain.difference).toBeCloseTo(20 * Math.log10(2), 9)
      expect(phase.difference).toBeCloseTo(0, 9)
    }
    expect(differences[0]?.bands.length).toBeGreaterThan(0)
  })

  it('are none where there is none, and not found in a condition of another system', async () => {
    expect(await compareLoopSources(loop.id, c2.id, context)).toEqual({ sources: [], differences: [] })
    const foreign = await buildCondition((await buildSystem(context)).id, context)
    await expect(compareLoopSources(loop.id, foreign.id, context)).rejects.toMatchObject({ code: 'notFound' })
  })
})

describe('break points of one closed system', () => {
  it('that contradict one another are told at both, on the board and on each loop, and no report is frozen', async () => {
    const rate = await buildLoop(system.id, context, { code: 'SL-R' })
    await buildSource(loop.id, c1.id, context, over('0.5/(s*(s+1)^2)'))
    await buildSource(rate.id, c1.id, context, over('8/(s*(s+1)^2)'))
    await updateLoop(loop.id, { version: 1, loopStates: [{ loopId: rate.id, state: 'closed' }] }, context)
    expect((await readBoard(system.id, context)).cells.map(cell => cell.disagreement)).toEqual([null, null, null, null])
    await updateLoop(rate.id, { version: 1, loopStates: [{ loopId: loop.id, state: 'closed' }] }, context)
    const { cells } = await readBoard(system.id, context)
    expect(cells.map(cell => cell.disagreement === null ? null : [cell.loopId, cell.conditionId])).toEqual([[loop.id, c1.id], null, [rate.id, c1.id], null])
    expect((await readLoop(rate.id, context)).cells[0]?.disagreement).toBe(cells[2]?.disagreement)
    const report = await createReport(system.id, { title: 'Margins', documentNumber: 'D-1' }, context)
    await expect(freezeRevision(report.id, { changeNote: 'x' }, context)).rejects.toMatchObject({
      code: 'refused', details: { obstacles: [expect.stringMatching(/^SL-P in C1: .*SL-R/) as string, expect.stringMatching(/^SL-R in C1: .*SL-P/) as string] },
    })
  })
})
