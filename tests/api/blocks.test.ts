import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Block, BlockInUse, MatricesFound } from '#shared/types/block'
import type { AnalysedSource, Source, Upload } from '#shared/types/source'
import type { BlockEffect, SourceDifference } from '#shared/types/structure'
import type { Board, System } from '#shared/types/system'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let engineer: ApiCaller
let at: string
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  engineer = await server.signedIn(teamEmails.engineer)
  at = `/api/systems/${server.seeded.system.id}`
})
afterAll(() => server.stop())

const typed = (expression: string) => ({ kind: 'expression', expression })
const add = (name: string, definition: object | null, fields: object = {}) => engineer.post<Block>(`${at}/blocks`, { name, role: 'plant', definition, ...fields })
const list = async () => (await engineer.get<BlockInUse[]>(`${at}/blocks`)).body

describe('the blocks of a system', () => {
  it('are refused without a name or role, with a field or kind they do not have, with numbers out of bounds', async () => {
    const wrong: [object, string][] = [
      [{ role: 'plant', definition: null }, 'name'],
      [{ name: 'G', role: 'motor', definition: null }, 'role'],
      [{ name: 'G', role: 'plant', definition: null, gain: 2 }, ''],
      [{ name: 'z', role: 'plant', definition: null }, 'name'],
      [{ name: 'G', role: 'plant', definition: { kind: 'hold', hold: 'zeroOrder', sampleTime: 0 } }, 'definition.sampleTime'],
      [{ name: 'G', role: 'plant', definition: { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: 1e-5, duty: 1.5 } }, 'definition.duty'],
      [{ name: 'G', role: 'plant', definition: { kind: 'sections', rows: [['1', '0']], gain: '1', sampleTime: 1 } }, 'definition.rows[0]'],
      [{ name: 'G', role: 'plant', definition: null, byCondition: { one: typed('1') } }, 'byCondition.one'],
      [{ name: 'G', role: 'plant', definition: typed('1/(s+') }, 'definition.expression'],
    ]
    for (const [body, path] of wrong) {
      const reply = await engineer.post<{ error: { path?: string } }>(`${at}/blocks`, body)
      expect({ status: reply.status, path: reply.body.error.path ?? '' }).toEqual({ status: 400, path })
    }
    expect(await list()).toEqual([])
  })

  it('are made, changed from the newest version only, put in order, deleted and restored', async () => {
    const { status, body: block } = await add('G', typed('1/(s*(s+1)^2)'), { unitIn: 'V', unitOut: 'rad', byCondition: { [server.seeded.condition.id]: typed('0.5/(s*(s+1)^2)') } })
    expect(status).toBe(201)
    expect(block).toMatchObject({ name: 'G', role: 'plant', unitIn: 'V', unitOut: 'rad', notes: '', version: 1, byCondition: { [server.seeded.condition.id]: typed('0.5/(s*(s+1)^2)') } })
    expect(await engineer.patch(`/api/blocks/${block.id}`, { version: 1, unitOut: 'deg' })).toMatchObject({ status: 200, body: { unitOut: 'deg', version: 2, definition: typed('1/(s*(s+1)^2)') } })
    expect(await engineer.patch(`/api/blocks/${block.id}`, { version: 1, unitOut: 'mrad' })).toMatchObject({ status: 409, body: { error: { path: 'version', details: { current: { unitOut: 'deg', version: 2 } } } } })
    const { body: other } = await add('H', typed('1'))
    expect(await engineer.put(`${at}/blocks/order`, { ids: [other.id, block.id] })).toMatchObject({ status: 200 })
    expect((await list()).map(({ name }) => name)).toEqual(['H', 'G'])
    expect(await engineer.put(`${at}/blocks/order`, { ids: [other.id] })).toMatchObject({ status: 409, body: { error: { details: { current: [other.id, block.id] } } } })
    expect(await engineer.delete(`/api/blocks/${other.id}`)).toMatchObject({ status: 200, body: { id: other.id } })
    expect((await engineer.patch(`/api/blocks/${other.id}`, { version: 1, notes: '' })).status).toBe(404)
    expect(await engineer.post(`/api/blocks/${other.id}/restore`)).toMatchObject({ status: 200, body: { name: 'H' } })
  })

  it('are not found in another system, nor by who has no role in theirs', async () => {
    const [block] = await list() as [BlockInUse]
    const { body: foreign } = await (await server.signedIn(teamEmails.outsider)).post<System>('/api/systems', { name: 'Foreign', frequencyUnit: 'Hz' })
    const outsider = await server.signedIn(teamEmails.outsider)
    expect((await outsider.patch(`/api/blocks/${block.id}`, { version: block.version, notes: 'mine' })).status).toBe(404)
    expect((await outsider.put(`/api/systems/${foreign.id}/blocks/order`, { ids: [block.id] })).status).toBe(409)
    expect((await outsider.post(`/api/systems/${foreign.id}/blocks/effects`, { blockId: block.id, name: 'G', role: 'plant', definition: null, byCondition: {} })).status).toBe(404)
    expect((await engineer.get(`${at}/blocks/effects`)).status).toBe(404)
  })

  it('build loop gains: a change tells first what it moves, is refused while its name is used, and comes true', async () => {
    const { loop, condition } = server.seeded
    const { status, body: [source] } = await engineer.post<Source[]>(`/api/loops/${loop.id}/sources`, { conditionIds: [condition.id], name: 'from blocks', definition: typed('H*G'), ofRecord: true })
    expect(status).toBe(201)
    const block = (await list()).find(({ name }) => name === 'H') as BlockInUse
    expect(block).toMatchObject({ loopIds: [loop.id], blockNames: [] })
    const effects = await engineer.post<BlockEffect[]>(`${at}/blocks/effects`, { blockId: block.id, name: 'H', role: 'filter', definition: typed('2'), byCondition: {} })
    expect(effects).toMatchObject({ status: 200, body: [{ loopId: loop.id, conditionId: condition.id, moved: true }] })
    expect(await engineer.patch(`/api/blocks/${block.id}`, { version: block.version, name: 'Q' })).toMatchObject({ status: 422, body: { error: { path: 'name', details: { uses: ['SL-P (from blocks in CALM)'] } } } })
    expect((await engineer.delete(`/api/blocks/${block.id}`)).status).toBe(422)
    expect((await engineer.patch(`/api/blocks/${block.id}`, { version: block.version, definition: typed('2') })).status).toBe(200)
    const analysed = (await engineer.get<AnalysedSource>(`/api/sources/${source?.id}`)).body
    expect(analysed.analysis?.summary?.gainIncrease).toBeCloseTo(effects.body[0]?.after?.summary?.gainIncrease ?? Number.NaN, 12)
  })

  it('come along with the system, the board and the loop', async () => {
    const { loop, condition } = server.seeded
    expect((await engineer.get<{ blocks: Block[] }>(at)).body.blocks.map(({ name }) => name)).toEqual(['H', 'G'])
    expect((await engineer.get<Board>(`${at}/board`)).body.cells[0]).toMatchObject({ disagreement: null })
    const { body } = await engineer.get<{ blocks: Block[], loops: object[] }>(`/api/loops/${loop.id}`)
    expect(body.loops).toEqual([{ id: loop.id, code: 'SL-P', name: 'Slew position' }])
    expect((await engineer.get(`/api/conditions/${condition.id}/gains`)).body).toEqual({ H: typed('2'), G: typed('0.5/(s*(s+1)^2)') })
  })

  it('stand beside the other sources of a loop with their differences', async () => {
    const { loop, condition } = server.seeded
    const { body } = await engineer.get<{ sources: AnalysedSource[], differences: SourceDifference[] }>(`/api/loops/${loop.id}/conditions/${condition.id}/sources`)
    expect(body.sources[0]?.source).toMatchObject({ name: 'from blocks', ofRecord: true })
    expect(body.differences).toHaveLength(body.sources.length - 1)
    expect(body.differences[0]).toMatchObject({ reference: 'from blocks', reason: null })
  })
})

describe('a file of matrices', () => {
  it('tells what it holds, or every fault by its line', async () => {
    const sent = async (text: string) => (await engineer.upload<Upload>(`${at}/uploads`, text, 'plant.csv')).body.id
    const set = 'A\n-1\nB\n1\nC\n1\nD\n0\n'
    const ask = (uploadId: number, fields: object = { states: null }) => engineer.post<MatricesFound>(`${at}/matrices`, { uploadId, ...fields })
    expect(await ask(await sent(`outputs, rate\ncondition, C1\n${set}condition, C2\n${set}`))).toMatchObject({
      status: 200, body: { sets: ['C1', 'C2'].map(name => ({ name, states: 1, inputCount: 1, outputCount: 1, inputs: [], outputs: ['rate'], sampleTime: null })), problems: [] },
    })
    expect((await ask(await sent('A\n-1,2\nB\n1\nC\n1\nD\n0\n'))).body).toMatchObject({ sets: [], problems: [{ line: 1 }, { line: 3 }, { line: 6 }] })
    expect((await ask(await sent('-1,1\n1,0\n'), { states: 1 })).body.sets).toMatchObject([{ name: 'set 1', states: 1 }])
    expect(await ask(4711)).toMatchObject({ status: 400, body: { error: { path: 'uploadId' } } })
    expect((await ask(1, { states: 0 })).status).toBe(400)
  })
})
