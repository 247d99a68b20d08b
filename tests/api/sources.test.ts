import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { AnalysedSource, Source, SourceDefinition, Upload } from '#shared/types/source'
import type { Board, Loop, OperatingCondition } from '#shared/types/system'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let engineer: ApiCaller
let loop: Loop
let conditions: OperatingCondition[]
const model: SourceDefinition = { kind: 'coefficients', numerator: [1], denominator: [1, 2, 1, 0] }

beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  engineer = await server.signedIn(teamEmails.engineer)
  const systemId = server.seeded.system.id
  conditions = []
  for (const code of ['K1', 'K2', 'K3', 'K4', 'K5', 'K6']) conditions.push((await engineer.post<OperatingCondition>(`/api/systems/${systemId}/conditions`, { code, name: code })).body)
  loop = (await engineer.post<Loop>(`/api/systems/${systemId}/loops`, { code: 'X', name: 'X' })).body
  await engineer.put(`/api/systems/${systemId}/parameters`, { parameters: [{ name: 'wz', unit: 'rad/s', notes: '', values: { [at(0)]: 2 } }] })
})
afterAll(() => server.stop())

const at = (index: number) => conditions[index]?.id as number
const add = (fields: object) => engineer.post<Source[]>(`/api/loops/${loop.id}/sources`, { name: 'design model', definition: model, ofRecord: true, ...fields })
const one = async (fields: object) => (await add(fields)).body[0] as Source
const read = async (id: number) => (await engineer.get<AnalysedSource>(`/api/sources/${id}`)).body
const cell = async (index: number) => (await engineer.get<Board>(`/api/systems/${server.seeded.system.id}/board`)).body.cells.find(entry => entry.loopId === loop.id && entry.conditionId === at(index))

describe('a source', () => {
  it('is one row for each condition, of record where it is the first', async () => {
    const { status, body } = await add({ conditionIds: [at(1), at(2)], ofRecord: false, setAsideReason: 'early guess' })
    expect(status).toBe(201)
    expect(body).toMatchObject([{ conditionId: at(1), ofRecord: true, setAsideReason: '' }, { conditionId: at(2), ofRecord: true }])
  })

  it('of record sets the former aside, with the reason', async () => {
    const former = await one({ conditionIds: [at(3)], name: 'design model' })
    const newer = await one({ conditionIds: [at(3)], name: 'correlated model' })
    expect((await read(former.id)).source).toMatchObject({ ofRecord: false, setAsideReason: 'replaced by correlated model', version: 2 })
    expect(await cell(3)).toMatchObject({ source: { id: newer.id } })
    expect(await engineer.post(`/api/sources/${former.id}/of-record`, { setAsideReason: 'correlated on the wrong run' })).toMatchObject({ status: 200, body: { ofRecord: true, setAsideReason: '' } })
    expect((await read(newer.id)).source).toMatchObject({ ofRecord: false, setAsideReason: 'correlated on the wrong run' })
    expect((await engineer.post(`/api/sources/${newer.id}/of-record`, { setAsideReason: ' ' })).status).toBe(400)
  })

  it('of record stays while there are others; the last one may go and come back', async () => {
    const first = await one({ conditionIds: [at(4)] })
    const second = await one({ conditionIds: [at(4)], name: 'second' })
    expect(await engineer.delete(`/api/sources/${second.id}`)).toMatchObject({ status: 422, body: { error: { message: expect.stringContaining('Choose another one') as string } } })
    expect((await engineer.delete(`/api/sources/${first.id}`)).status).toBe(200)
    expect((await engineer.delete(`/api/sources/${second.id}`)).status).toBe(200)
    expect(await cell(4)).toMatchObject({ source: null, judgement: { verdict: 'no data' } })
    expect(await engineer.post(`/api/sources/${first.id}/restore`)).toMatchObject({ status: 200, body: { ofRecord: true, setAsideReason: '' } })
    expect(await engineer.post(`/api/sources/${second.id}/restore`)).toMatchObject({ status: 200, body: { ofRecord: false, setAsideReason: 'deleted, meanwhile replaced by design model' } })
  })

  it('is refused for conditions of another system, twice the same, or none', async () => {
    expect(await add({ conditionIds: [4711] })).toMatchObject({ status: 400, body: { error: { path: 'conditionIds[0]' } } })
    expect((await add({ conditionIds: [at(0), at(0)] })).status).toBe(400)
    expect(await add({ conditionIds: [] })).toMatchObject({ status: 400, body: { error: { path: 'conditionIds' } } })
  })

  it('is changed from its newest version only, and analysed again', async () => {
    const source = await one({ conditionIds: [at(5)] })
    const before = (await read(source.id)).analysis as LoopAnalysis
    // 1/(s (s + 1)^2): 20 log10 2 dB at w = 1, closed form as derived with the criteria of a system
    expect(before.phaseCrossovers[0]?.gainMargin).toBeCloseTo(20 * Math.log10(2), 6)
    const change = { version: 1, name: 'design model', definition: { ...model, numerator: [0.5] }, setAsideReason: '' }
    const { status, body } = await engineer.put<AnalysedSource>(`/api/sources/${source.id}`, change)
    expect(status).toBe(200)
    expect(body.source.version).toBe(2)
    expect(body.analysis?.phaseCrossovers[0]?.gainMargin).toBeCloseTo(20 * Math.log10(4), 6)
    expect(await engineer.put(`/api/sources/${source.id}`, change)).toMatchObject({ status: 409, body: { error: { details: { current: { version: 2 } } } } })
  })
})

describe('an expression', () => {
  const put = (expression: string, extra: object = {}) => add({ conditionIds: [at(0)], definition: { kind: 'expression', expression, ...extra } })

  it('is refused at the place that cannot be read', async () => {
    expect(await put('25*(s+wq)/(s*(s+10))')).toMatchObject({ status: 400, body: { error: { path: 'definition.expression', details: { position: 6 } } } })
    expect(await put('25*(s+wz')).toMatchObject({ status: 400, body: { error: { path: 'definition.expression' } } })
    expect(await put('sqrt(s)')).toMatchObject({ status: 400, body: { error: { path: 'definition.expression' } } })
    expect(await put('1/(z-1)')).toMatchObject({ status: 400, body: { error: { path: 'definition.expression' } } })
    expect(await put(`1${'+1'.repeat(6000)}`)).toMatchObject({ status: 400, body: { error: { path: 'definition.expression' } } })
  })

  it('takes the value each condition gives its parameters; where one is missing the cell says so', async () => {
    const { status, body } = await add({ conditionIds: [at(0), at(1)], name: 'with zero', definition: { kind: 'expression', expression: '25*(s+wz)/(s^2*(s+10))' } })
    expect(status).toBe(201)
    expect(body).toHaveLength(2)
    const filled = await cell(0)
    expect(filled?.failure).toBeNull()
    expect(filled?.analysis?.stability.verdict).toBe('stable')
    expect(await cell(1)).toMatchObject({ source: { name: 'with zero' }, analysis: null, failure: { message: 'The parameter wz has no value in the condition K2.', path: 'parameters.wz' }, judgement: { verdict: 'no data' } })
    expect((await read((body[0] as Source).id)).input).toMatchObject({ expression: '25*(s+wz)/(s^2*(s+10))', parameters: { wz: 2 }, frequencyUnit: 'rad/s' })
  })
})

describe('numbers the engine does not take', () => {
  it.each([
    [{ kind: 'coefficients', numerator: [1], denominator: [0, 0] }, 'definition.denominator'],
    [{ kind: 'coefficients', numerator: [], denominator: [1, 1] }, 'definition.numerator'],
    [{ kind: 'coefficients', numerator: [1], denominator: [1, 1], deadTime: -1 }, 'definition.deadTime'],
    [{ kind: 'coefficients', numerator: [1, 0], denominator: [1], deadTime: 0.1 }, 'definition.numerator'],
    [{ kind: 'zerosPoles', zeros: [], poles: [[-1, 2]], gain: 1 }, 'definition.poles[0]'],
    [{ kind: 'zerosPoles', zeros: [], poles: [[-1, 'x']], gain: 1 }, 'definition.poles[0][1]'],
    [{ kind: 'stateSpace', a: [] }, 'definition.kind'],
  ])('%j is refused at %s', async (definition, path) => {
    expect(await add({ conditionIds: [at(0)], definition })).toMatchObject({ status: 400, body: { error: { path } } })
  })
})

describe('a measured response', () => {
  const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' }
  const good = 'frequency [Hz],gain [dB],phase [deg]\n1,20,-100\n2,10,-120\n5,0,-150\n10,-10,-170\n20,-20,-185\n'
  const store = async (text: string, name?: string) => (await engineer.upload<Upload>(`/api/systems/${server.seeded.system.id}/uploads`, text, name)).body

  it('keeps the file byte for byte and hands it back for saving only', async () => {
    const { status, body: upload } = await engineer.upload<Upload>(`/api/systems/${server.seeded.system.id}/uploads`, good, '../../Prüfung (1).csv')
    expect(status).toBe(201)
    expect(upload).toEqual({ id: upload.id, fileName: 'Prüfung (1).csv', size: Buffer.byteLength(good), sha256: createHash('sha256').update(good).digest('hex') })
    const reply = await engineer.get<string>(`/api/uploads/${upload.id}`)
    expect(reply.body).toBe(good)
    expect(reply.headers.get('content-disposition')).toBe('attachment; filename="Pr_fung _1_.csv"; filename*=UTF-8\'\'Pr%C3%BCfung%20%281%29.csv')
    expect(reply.headers.get('content-type')).toBe('application/octet-stream')
    expect(reply.headers.get('content-security-policy')).toContain('sandbox')
  })

  it('is analysed in the unit of the system', async () => {
    const upload = await store(good)
    const source = await one({ conditionIds: [at(2)], name: 'sweep 1', definition: { kind: 'measured', uploadId: upload.id, mapping, stayedStable: true } })
    const analysed = await read(source.id)
    expect(analysed.failure).toBeNull()
    // 0 dB is met at the sample at 5 Hz = 10 pi rad/s, with -150 deg: 30 deg of lag are left
    expect(analysed.analysis?.gainCrossovers).toMatchObject([{ slope: 'falling' }])
    expect(analysed.analysis?.gainCrossovers[0]?.frequency).toBeCloseTo(10 * Math.PI, 6)
    expect(analysed.analysis?.gainCrossovers[0]?.phaseMargin).toBeCloseTo(30, 6)
    expect(analysed.analysis).toMatchObject({ coverage: { proven: false } })
  })

  it('with bad rows is refused with every bad line, and nothing is stored', async () => {
    const upload = await store('frequency [Hz],gain [dB],phase [deg]\n1,20,-100\n2,x,-120\n5,0,-150\n4,-10,-170\n20,-20,\n')
    const before = (await engineer.get<{ sources: Source[] }>(`/api/loops/${loop.id}`)).body.sources.length
    const reply = await engineer.post<{ error: { code: string, details: { problems: { line: number }[] } } }>(`/api/loops/${loop.id}/sources`, {
      conditionIds: [at(2)], name: 'sweep 2', definition: { kind: 'measured', uploadId: upload.id, mapping }, ofRecord: true,
    })
    expect(reply.status).toBe(422)
    expect(reply.body.error.details.problems.map(problem => problem.line)).toEqual([3, 5, 6])
    expect((await engineer.get<{ sources: Source[] }>(`/api/loops/${loop.id}`)).body.sources).toHaveLength(before)
  })

  it('is refused without a file, with a file of another system, empty, or too large', async () => {
    const path = `/api/systems/${server.seeded.system.id}/uploads`
    expect(await engineer.post(path, { file: 'x' })).toMatchObject({ status: 400, body: { error: { path: 'file' } } })
    expect(await engineer.post(path, new FormData())).toMatchObject({ status: 400, body: { error: { path: 'file' } } })
    expect(await engineer.upload(path, '')).toMatchObject({ status: 400, body: { error: { message: 'The file is empty.' } } })
    expect(await engineer.upload(path, 'x'.repeat(20 * 1024 * 1024 + 1))).toMatchObject({ status: 413, body: { error: { code: 'tooLarge', path: 'file' } } })
    const other = (await engineer.post<{ id: number }>('/api/systems', { name: 'Other', frequencyUnit: 'Hz' })).body
    const foreign = (await engineer.upload<Upload>(`/api/systems/${other.id}/uploads`, good)).body
    expect(await add({ conditionIds: [at(2)], definition: { kind: 'measured', uploadId: foreign.id, mapping } })).toMatchObject({ status: 400, body: { error: { path: 'definition.uploadId' } } })
  })
})

describe('an analysis of inputs that are not stored', () => {
  it('gives one for one and a list for a list, with errors in their places', async () => {
    const integrator = { numerator: [1], denominator: [1, 0] }
    const single = await engineer.post<LoopAnalysis>('/api/analyses', integrator)
    expect(single.status).toBe(200)
    // 1/s: |L| = 1 at w = 1 with arg L = -90 deg: 90 deg of lag, (pi/2)/1 s of delay; closed form
    expect(single.body.gainCrossovers[0]).toMatchObject({ frequency: 1, phaseMargin: 90 })
    expect(single.body.gainCrossovers[0]?.delayMargin).toBeCloseTo(Math.PI / 2, 9)
    const list = await engineer.post<unknown[]>('/api/analyses', [integrator, { numerator: [1], denominator: [0] }, 'nonsense'])
    expect(list.body).toMatchObject([{ gainCrossovers: [{ frequency: 1 }] }, { error: { path: 'denominator' } }, { error: { message: expect.any(String) as string } }])
  })

  it('is refused when the request is larger than any loop could be', async () => {
    const huge = `{"numerator":[${'1,'.repeat(26_000_000)}1]}`
    expect(await engineer.post('/api/analyses', huge)).toMatchObject({ status: 413, body: { error: { code: 'tooLarge' } } })
  })
})
