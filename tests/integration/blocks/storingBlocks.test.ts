import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { limits } from '#shared/schemas/limits'
import type { Block, BlockDefinition } from '#shared/types/block'
import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { BlockGainRow } from '#server/database/models/BlockGainRow'
import { BlockRow } from '#server/database/models/BlockRow'
import { UploadRow } from '#server/database/models/UploadRow'
import { deleteBlock } from '#server/services/blocks/deleteBlock'
import { listBlocks } from '#server/services/blocks/listBlocks'
import { listBlocksInUse } from '#server/services/blocks/listBlocksInUse'
import { restoreBlock } from '#server/services/blocks/restoreBlock'
import { updateBlock } from '#server/services/blocks/updateBlock'
import { copyCondition } from '#server/services/conditions/copyCondition'
import { deleteCondition } from '#server/services/conditions/deleteCondition'
import { listConditions } from '#server/services/conditions/listConditions'
import { restoreCondition } from '#server/services/conditions/restoreCondition'
import type { ServiceContext } from '#server/services/context'
import { updateLoop } from '#server/services/loops/updateLoop'
import { replaceParameters } from '#server/services/parameters/replaceParameters'
import { copySystem } from '#server/services/systems/copySystem'
import { removeUnusedUploads } from '#server/services/uploads/removeUnusedUploads'
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
})

const names = async () => (await listBlocks(system.id)).map(block => block.name)
const upload = async (text: string) => (await storeUpload(system.id, { name: 'plant.csv', bytes: Buffer.from(text) }, context)).id
const matricesOf = (uploadId: number, set: string | null = null): BlockDefinition => ({ kind: 'stateSpace', uploadId, set, states: null, inputs: [], outputs: [] })
const oneState = (name: string, pole: number) => `condition, ${name}\nA\n${pole}\nB\n1\nC\n1\nD\n0\n`

describe('a block that cannot be read by itself', () => {
  it.each([
    ['an expression that ends in the middle', typed('k*('), 'definition.expression', 'bracket'],
    ['an unknown name', typed('1/(s+wQ)'), 'definition.expression', 'Unknown name "wQ"'],
    ['itself', typed('1/(1+G)'), 'definition.expression', 'names itself'],
    ['a section whose cell is no number', { kind: 'sections', rows: [['1', '0', '0', '1', 'x', '0']], gain: '1', sampleTime: 0.001 }, 'definition.rows[0][4]', 'no number'],
    ['a file that is not there', matricesOf(4711), 'definition.uploadId', 'no longer there'],
    ['more zeros than poles in an expression', typed('1/(s+1) + 0.1*s'), 'definition.expression', 'Improper'],
    ['more zeros than poles in coefficients', { kind: 'coefficients', numerator: [1, 0, 0], denominator: [1, 1] }, 'definition.numerator', 'Improper'],
    ['poles without their conjugates', { kind: 'zerosPoles', zeros: [], poles: [[-1, 2]], gain: 1 }, 'definition.poles[0]', 'conjugate'],
  ] as const)('is refused with %s at its place, and nothing is stored', async (_, definition, path, message) => {
    await expect(buildBlock(system.id, context, 'G', definition as never)).rejects.toMatchObject({ code: 'invalidInput', path, message: expect.stringContaining(message) as string })
    await expect(buildBlock(system.id, context, 'G', null, { byCondition: { [c2.id]: definition as never } })).rejects.toMatchObject({ path: path.replace('definition', `byCondition.${c2.id}`) })
    expect(await names()).toEqual([])
    expect(await BlockGainRow.count()).toBe(0)
  })

  it('tells the character of a fault in an expression', async () => {
    await expect(buildBlock(system.id, context, 'G', typed('1/(s+wQ)'))).rejects.toMatchObject({ details: { position: 5 } })
  })

  it('tells every bad line of a file of matrices', async () => {
    const uploadId = await upload('A\n1,2\n3\nB\n1\n1\nC\n1,0\nD\n0')
    await expect(buildBlock(system.id, context, 'G', matricesOf(uploadId))).rejects.toMatchObject({
      path: 'definition.uploadId', message: 'The file cannot be read like this: line 3: row 2 of A has 1 number, 2 are needed', details: { problems: [{ line: 3, message: 'row 2 of A has 1 number, 2 are needed' }] },
    })
  })

  it('is refused with a gain in a condition of another system', async () => {
    const foreign = await buildCondition((await buildSystem(context)).id, context)
    await expect(buildBlock(system.id, context, 'G', null, { byCondition: { [foreign.id]: typed('1') } })).rejects.toMatchObject({ code: 'invalidInput', path: `byCondition.${foreign.id}` })
  })

  it('is refused for the one condition in which it has more zeros than poles, by another block too', async () => {
    await buildBlock(system.id, context, 'F', typed('1/(s+1)'), { byCondition: { [c2.id]: typed('1') } })
    const c = await buildBlock(system.id, context, 'C', typed('2'))
    await expect(updateBlock(c.id, { version: 1, definition: typed('(1+s)*F') }, context)).rejects.toMatchObject({ path: 'definition.expression', message: expect.stringContaining('Improper') as string })
    await expect(updateBlock(c.id, { version: 1, byCondition: { [c1.id]: typed('s') } }, context)).rejects.toMatchObject({ path: `byCondition.${c1.id}.expression` })
    await updateBlock(c.id, { version: 1, byCondition: { [c1.id]: typed('(1+s)*F') } }, context)
    expect((await listBlocks(system.id)).map(block => block.version)).toEqual([1, 2])
  })

  it('is refused where a change closes a circle, also one in a single condition', async () => {
    const g = await buildBlock(system.id, context, 'G', typed('1/s'))
    const h = await buildBlock(system.id, context, 'H', typed('2*G'))
    await buildBlock(system.id, context, 'K', typed('3*H'))
    await expect(updateBlock(g.id, { version: 1, definition: typed('1/(s+K)') }, context)).rejects.toMatchObject({ path: 'definition.expression', message: expect.stringContaining('G, K, H, G') as string, details: { position: 5 } })
    await expect(updateBlock(g.id, { version: 1, byCondition: { [c1.id]: typed('K') } }, context)).rejects.toMatchObject({ path: `byCondition.${c1.id}.expression` })
    await updateBlock(h.id, { version: 1, byCondition: { [c1.id]: typed('2') } }, context)
    // In C1 H no longer needs G, so G may need K there.
    await updateBlock(g.id, { version: 1, byCondition: { [c1.id]: typed('K') } }, context)
    await expect(updateBlock(h.id, { version: 2, byCondition: {} }, context)).rejects.toMatchObject({ code: 'invalidInput' })
    expect((await listBlocks(system.id)).map(block => block.version)).toEqual([2, 2, 1])
  })
})

describe('the name of a block', () => {
  it('is not that of another block, nor of a parameter; nor is a parameter\'s that of a block', async () => {
    await replaceParameters(system.id, [{ name: 'kp', unit: '', notes: '', values: {} }], context)
    await buildBlock(system.id, context, 'G', typed('1/s'))
    await expect(buildBlock(system.id, context, 'G', null)).rejects.toMatchObject({ code: 'conflict', path: 'name' })
    await expect(buildBlock(system.id, context, 'kp', null)).rejects.toMatchObject({ code: 'conflict', path: 'name' })
    await expect(replaceParameters(system.id, [{ name: 'a', unit: '', notes: '', values: {} }, { name: 'G', unit: '', notes: '', values: {} }], context)).rejects.toMatchObject({ code: 'invalidInput', path: 'parameters[1].name' })
  })

  it.each(['s', 'z', 'exp', 'pi', 'i', 'j', '', '2G', 'G H', '__proto__'])('is not "%s"', async (name) => {
    await expect(async () => buildBlock(system.id, context, name, null)).rejects.toThrow()
  })

  it('stays while it is used, and is told where', async () => {
    const g = await buildBlock(system.id, context, 'G', typed('1/(s*(s+1))'))
    await buildBlock(system.id, context, 'GH', typed('G/(1+G)'))
    await buildSource(loop.id, c1.id, context, { kind: 'expression', expression: '2*G' })
    await updateLoop(loop.id, { version: 1, breakAt: { block: 'G', side: 'output' } }, context)
    const refused = { code: 'refused', path: 'name', details: { uses: [expect.stringMatching(/^SL-P \(design model \d+ in C1\)$/) as string, 'the block GH', 'the break point of SL-P'] } }
    await expect(updateBlock(g.id, { version: 1, name: 'P' }, context)).rejects.toMatchObject(refused)
    await expect(deleteBlock(g.id, context)).rejects.toMatchObject(refused)
    expect(await names()).toEqual(['G', 'GH'])
  })
})

describe('a block', () => {
  it('that is deleted comes back with its gains, unless its name has been taken or it names what is gone', async () => {
    const g = await buildBlock(system.id, context, 'G', typed('1/s'), { byCondition: { [c1.id]: typed('2/s') } })
    await deleteBlock(g.id, context)
    expect(await names()).toEqual([])
    const other = await buildBlock(system.id, context, 'G', null)
    await expect(restoreBlock(g.id, context)).rejects.toMatchObject({ code: 'conflict', path: 'name' })
    await deleteBlock(other.id, context)
    expect(await restoreBlock(g.id, context)).toMatchObject({ name: 'G', definition: typed('1/s'), byCondition: { [c1.id]: typed('2/s') } })
    await replaceParameters(system.id, [{ name: 'kp', unit: '', notes: '', values: {} }], context)
    const h = await buildBlock(system.id, context, 'H', typed('kp*G'))
    await deleteBlock(h.id, context)
    await replaceParameters(system.id, [], context)
    await expect(restoreBlock(h.id, context)).rejects.toMatchObject({ code: 'invalidInput', path: 'definition.expression', details: { position: 0 } })
  })

  it('keeps its gain in a condition that is deleted and restored, also when the others are changed meanwhile', async () => {
    const g = await buildBlock(system.id, context, 'G', null, { byCondition: { [c1.id]: typed('1'), [c2.id]: typed('2') } })
    await deleteCondition(c1.id, context)
    expect((await updateBlock(g.id, { version: 1, byCondition: { [c2.id]: typed('3') } }, context)).byCondition).toEqual({ [c2.id]: typed('3') })
    await restoreCondition(c1.id, context)
    expect((await listBlocks(system.id))[0]?.byCondition).toEqual({ [c1.id]: typed('1'), [c2.id]: typed('3') })
  })

  it('is not brought into a circle by a condition that is restored after others were changed', async () => {
    const g = await buildBlock(system.id, context, 'G', typed('1'))
    await buildBlock(system.id, context, 'H', typed('2'), { byCondition: { [c1.id]: typed('G/s') } })
    await deleteCondition(c1.id, context)
    const changed = await updateBlock(g.id, { version: 1, definition: typed('1/(1+H)') }, context)
    await expect(restoreCondition(c1.id, context)).rejects.toMatchObject({ code: 'invalidInput', message: expect.stringContaining('in a circle: H, G, H') as string })
    expect((await listConditions(system.id)).map(({ code }) => code)).toEqual(['C2'])
    await updateBlock(g.id, { version: changed.version, definition: typed('3') }, context)
    expect(await restoreCondition(c1.id, context)).toMatchObject({ code: 'C1' })
  })

  it('tells which loops and blocks depend on it, directly and by others', async () => {
    await buildBlock(system.id, context, 'G', typed('1/(s*(s+1))'))
    await buildBlock(system.id, context, 'F', null, { byCondition: { [c2.id]: typed('G/(1+G)') } })
    await buildBlock(system.id, context, 'idle', typed('1'))
    await buildSource(loop.id, c1.id, context, { kind: 'expression', expression: '2*F' })
    expect((await listBlocksInUse(system.id)).map(({ name, loopIds, blockNames }) => ({ name, loopIds, blockNames }))).toEqual([
      { name: 'G', loopIds: [loop.id], blockNames: ['F'] }, { name: 'F', loopIds: [loop.id], blockNames: [] }, { name: 'idle', loopIds: [], blockNames: [] },
    ])
  })

  it('is copied with its condition, and with its system, files and all', async () => {
    const uploadId = await upload(oneState('C1', -1) + oneState('C2', -2))
    await buildBlock(system.id, context, 'G', matricesOf(uploadId, 'C1'), { byCondition: { [c2.id]: matricesOf(uploadId, 'C2') } })
    const c3 = await copyCondition(c2.id, { code: 'C3', name: 'Third' }, context)
    expect((await listBlocks(system.id))[0]?.byCondition).toEqual({ [c2.id]: matricesOf(uploadId, 'C2'), [c3.id]: matricesOf(uploadId, 'C2') })
    const copy = await copySystem(system.id, 'Copy', context)
    const [twin] = await listBlocks(copy.id) as [Block]
    const uploads = await UploadRow.findAll({ where: { systemId: copy.id } })
    expect(uploads).toHaveLength(1)
    expect([twin.definition, ...Object.values(twin.byCondition)].map(definition => definition && 'uploadId' in definition && definition.uploadId)).toEqual(Array.from({ length: 3 }, () => uploads[0]?.id))
    expect(Object.keys(twin.byCondition)).toHaveLength(2)
  })

  it('keeps the files it reads, deleted or not, when unused ones are removed', async () => {
    const [own, inCondition, idle] = [await upload(oneState('C1', -1)), await upload(oneState('C1', -2)), await upload('unused')]
    const g = await buildBlock(system.id, context, 'G', matricesOf(own), { byCondition: { [c1.id]: matricesOf(inCondition) } })
    await deleteBlock(g.id, context)
    await removeUnusedUploads(() => new Date(Date.now() + 10 * 86_400_000))
    expect((await UploadRow.findAll({ where: { id: [own, inCondition, idle] } })).map(row => row.id)).toEqual([own, inCondition])
  })

  it('is one of at most as many as a system holds', async () => {
    await BlockRow.bulkCreate(Array.from({ length: limits.blocks }, (_, index) => ({
      systemId: system.id, name: `B${index}`, role: 'other' as const, unitIn: '', unitOut: '', notes: '', definition: null, uploadId: null, position: index, version: 1, createdAt: context.clock().toISOString(),
    })))
    await expect(buildBlock(system.id, context, 'G', null)).rejects.toMatchObject({ code: 'refused', message: 'A system holds at most 500 blocks.' })
  })
})
