import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Criterion } from '#shared/types/criterion'
import type { Board, Loop, OperatingCondition, Parameter, System, SystemSummary } from '#shared/types/system'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let engineer: ApiCaller
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  engineer = await server.signedIn(teamEmails.engineer)
})
afterAll(() => server.stop())

const fresh = async (name = 'Bench') => (await engineer.post<System>('/api/systems', { name, frequencyUnit: 'Hz' })).body
const addLoop = async (systemId: number, code: string) => (await engineer.post<Loop>(`/api/systems/${systemId}/loops`, { code, name: `Loop ${code}` })).body
const addCondition = async (systemId: number, code: string) => (await engineer.post<OperatingCondition>(`/api/systems/${systemId}/conditions`, { code, name: `Condition ${code}` })).body

describe('a system', () => {
  it('is refused without a name, with an unknown unit, with a field it does not have', async () => {
    expect(await engineer.post('/api/systems', { name: '  ', frequencyUnit: 'Hz' })).toMatchObject({ status: 400, body: { error: { path: 'name' } } })
    expect(await engineer.post('/api/systems', { name: 'X', frequencyUnit: 'rpm' })).toMatchObject({ status: 400, body: { error: { path: 'frequencyUnit', message: 'Must be rad/s or Hz.' } } })
    expect(await engineer.post('/api/systems', { name: 'X', frequencyUnit: 'Hz', id: 7 })).toMatchObject({ status: 400 })
  })

  it('begins with the customary criteria, and with its maker as engineer', async () => {
    const { status, body: system } = await engineer.post<System>('/api/systems', { name: 'New one', frequencyUnit: 'Hz' })
    expect(status).toBe(201)
    const { body } = await engineer.get<{ criteria: Criterion[], roles: string[] }>(`/api/systems/${system.id}`)
    // 6 dB, 30 deg and 0.5: common practice, no source
    expect(body.criteria).toEqual([{ quantity: 'gainMargin', limit: 6 }, { quantity: 'phaseMargin', limit: 30 }, { quantity: 'vectorMargin', limit: 0.5 }, { quantity: 'delayMargin', limit: null }])
    expect(body.roles).toEqual(['engineer'])
  })

  it('is changed from its newest version only; the newest goes along with the refusal', async () => {
    const system = await fresh()
    expect(await engineer.patch(`/api/systems/${system.id}`, { version: 1, name: 'Renamed' })).toMatchObject({ status: 200, body: { name: 'Renamed', version: 2, frequencyUnit: 'Hz' } })
    expect(await engineer.patch(`/api/systems/${system.id}`, { version: 1, name: 'Late' }))
      .toMatchObject({ status: 409, body: { error: { code: 'conflict', path: 'version', details: { current: { name: 'Renamed', version: 2 } } } } })
    expect(await engineer.patch(`/api/systems/${system.id}`, { name: 'No version' })).toMatchObject({ status: 400, body: { error: { path: 'version' } } })
  })

  it('is listed to those who have a role in it, and to administrators', async () => {
    const names = async (email: string) => (await (await server.signedIn(email)).get<SystemSummary[]>('/api/systems')).body.map(system => system.name)
    await fresh('Only the engineer sees it')
    expect(await names(teamEmails.engineer)).toContain('Only the engineer sees it')
    expect(await names(teamEmails.administrator)).toContain('Only the engineer sees it')
    expect(await names(teamEmails.customer)).toEqual(['Gangway'])
    expect(await names(teamEmails.outsider)).toEqual([])
  })

  it('tells how much it holds', async () => {
    const { body } = await engineer.get<SystemSummary[]>('/api/systems')
    expect(body.find(system => system.name === 'Gangway')).toMatchObject({ loopCount: 1, conditionCount: 1, roles: ['engineer'], newestIssue: null })
  })

  it('that is deleted is not found, with all it holds, until it is restored', async () => {
    const system = await fresh()
    const loop = await addLoop(system.id, 'A')
    expect(await engineer.delete(`/api/systems/${system.id}`)).toMatchObject({ status: 200, body: { id: system.id } })
    for (const path of [`/api/systems/${system.id}`, `/api/systems/${system.id}/board`, `/api/loops/${loop.id}`]) expect((await engineer.get(path)).status).toBe(404)
    expect((await engineer.delete(`/api/systems/${system.id}`)).status).toBe(404)
    expect((await engineer.post(`/api/loops/${loop.id}/restore`)).status).toBe(404)
    expect(await engineer.post(`/api/systems/${system.id}/restore`)).toMatchObject({ status: 200, body: { id: system.id } })
    expect((await engineer.get(`/api/loops/${loop.id}`)).status).toBe(200)
  })

  it('is copied whole: loops, conditions, parameters, criteria and sources, and no members but the one who copies', async () => {
    const { system: original, loop, condition } = server.seeded
    await engineer.put(`/api/systems/${original.id}/parameters`, { parameters: [{ name: 'kp', unit: '1', notes: '', values: { [condition.id]: 3 } }] })
    const form = await engineer.upload<{ id: number }>(`/api/systems/${original.id}/uploads`, 'f [Hz],gain [dB],phase [deg]\n1,20,-100\n2,10,-120\n5,0,-150\n')
    const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' }
    await engineer.post(`/api/loops/${loop.id}/sources`, { conditionIds: [condition.id], name: 'sweep 1', definition: { kind: 'measured', uploadId: form.body.id, mapping }, ofRecord: false })
    const { status, body: copy } = await engineer.post<System>(`/api/systems/${original.id}/copy`, { name: 'Gangway, second unit' })
    expect(status).toBe(201)
    const { body: board } = await engineer.get<Board>(`/api/systems/${copy.id}/board`)
    expect(board).toMatchObject({ system: { name: 'Gangway, second unit', customer: 'A yard' }, loops: [{ code: 'SL-P' }], conditions: [{ code: 'CALM' }] })
    expect(board.loops[0]?.id).not.toBe(loop.id)
    expect(board.cells[0]?.analysis).not.toBeNull()
    const { body: parameters } = await engineer.get<Parameter[]>(`/api/systems/${copy.id}/parameters`)
    expect(parameters).toMatchObject([{ name: 'kp', values: { [board.conditions[0]?.id as number]: 3 } }])
    const { body: copiedLoop } = await engineer.get<{ sources: { name: string, definition: { uploadId?: number } }[] }>(`/api/loops/${board.loops[0]?.id}`)
    const uploadId = copiedLoop.sources.find(source => source.name === 'sweep 1')?.definition.uploadId
    expect(uploadId).not.toBe(form.body.id)
    expect((await engineer.get(`/api/uploads/${uploadId}`)).body).toContain('2,10,-120')
    expect((await engineer.get(`/api/systems/${copy.id}/members`)).body).toMatchObject([{ person: { email: teamEmails.engineer }, roles: ['engineer'] }])
  })
})

describe.each([
  ['loops', addLoop],
  ['conditions', addCondition],
] as const)('the %s of a system', (noun, add) => {
  it('are refused with a code that is taken, or no code at all', async () => {
    const system = await fresh()
    await add(system.id, 'A')
    expect(await engineer.post(`/api/systems/${system.id}/${noun}`, { code: 'A', name: 'again' })).toMatchObject({ status: 409, body: { error: { path: 'code' } } })
    for (const code of ['', 'two words', '../up', 'x'.repeat(25)]) {
      expect(await engineer.post(`/api/systems/${system.id}/${noun}`, { code, name: 'odd' })).toMatchObject({ status: 400, body: { error: { path: 'code' } } })
    }
  })

  it('keep the order they are put in; a list that is not just them is refused', async () => {
    const system = await fresh()
    const [a, b, c] = [await add(system.id, 'A'), await add(system.id, 'B'), await add(system.id, 'C')]
    expect(await engineer.put(`/api/systems/${system.id}/${noun}/order`, { ids: [c.id, a.id, b.id] })).toMatchObject({ status: 200, body: { ids: [c.id, a.id, b.id] } })
    const list = async () => (await engineer.get<Record<string, { code: string }[]>>(`/api/systems/${system.id}`)).body[noun]?.map(row => row.code)
    expect(await list()).toEqual(['C', 'A', 'B'])
    expect(await engineer.put(`/api/systems/${system.id}/${noun}/order`, { ids: [a.id, b.id] })).toMatchObject({ status: 409, body: { error: { details: { current: [c.id, a.id, b.id] } } } })
    expect((await engineer.put(`/api/systems/${system.id}/${noun}/order`, { ids: [a.id, a.id, b.id] })).status).toBe(400)
    expect(await list()).toEqual(['C', 'A', 'B'])
  })

  it('are changed from their newest version only', async () => {
    const system = await fresh()
    const row = await add(system.id, 'A')
    expect(await engineer.patch(`/api/${noun}/${row.id}`, { version: 1, notes: 'mind the stop' })).toMatchObject({ status: 200, body: { notes: 'mind the stop', code: 'A', version: 2 } })
    expect(await engineer.patch(`/api/${noun}/${row.id}`, { version: 1, notes: 'late' })).toMatchObject({ status: 409, body: { error: { details: { current: { notes: 'mind the stop' } } } } })
    await add(system.id, 'B')
    expect(await engineer.patch(`/api/${noun}/${row.id}`, { version: 2, code: 'B' })).toMatchObject({ status: 409, body: { error: { path: 'code' } } })
    expect((await engineer.patch(`/api/${noun}/${row.id}`, { version: 2, position: 9 })).status).toBe(400)
  })

  it('come back from a deletion unless their code has been taken meanwhile', async () => {
    const system = await fresh()
    const first = await add(system.id, 'A')
    expect(await engineer.delete(`/api/${noun}/${first.id}`)).toMatchObject({ status: 200, body: { id: first.id } })
    expect((await engineer.patch(`/api/${noun}/${first.id}`, { version: 1, name: 'gone' })).status).toBe(404)
    const second = await add(system.id, 'A')
    expect(await engineer.post(`/api/${noun}/${first.id}/restore`)).toMatchObject({ status: 409, body: { error: { path: 'code' } } })
    await engineer.patch(`/api/${noun}/${second.id}`, { version: 1, code: 'B' })
    expect(await engineer.post(`/api/${noun}/${first.id}/restore`)).toMatchObject({ status: 200, body: { id: first.id, code: 'A' } })
  })

  it('are copied with their sources under a code of their own', async () => {
    const system = await fresh()
    const [loop, condition] = [await addLoop(system.id, 'L'), await addCondition(system.id, 'K')]
    await engineer.post(`/api/loops/${loop.id}/sources`, { conditionIds: [condition.id], name: 'design model', definition: { kind: 'coefficients', numerator: [1], denominator: [1, 2, 1, 0] }, ofRecord: true })
    const original = noun === 'loops' ? loop : condition
    expect((await engineer.post(`/api/${noun}/${original.id}/copy`, { code: original.code, name: 'same' })).status).toBe(409)
    expect(await engineer.post(`/api/${noun}/${original.id}/copy`, { code: 'COPY', name: 'The copy' })).toMatchObject({ status: 201, body: { code: 'COPY', name: 'The copy', position: 2, version: 1 } })
    const { body: board } = await engineer.get<Board>(`/api/systems/${system.id}/board`)
    expect(board.cells.map(cell => cell.source?.name)).toEqual(['design model', 'design model'])
    expect(board.cells[0]?.analysis).toEqual(board.cells[1]?.analysis)
  })
})

describe('the members of a system', () => {
  it('are set as a whole, several roles each', async () => {
    const system = await fresh()
    const members = [{ email: teamEmails.engineer, roles: ['engineer'] }, { email: teamEmails.checker, roles: ['approver', 'checker'] }]
    expect(await engineer.put(`/api/systems/${system.id}/members`, { members }))
      .toMatchObject({ status: 200, body: [{ person: { email: teamEmails.engineer }, roles: ['engineer'] }, { person: { email: teamEmails.checker }, roles: ['checker', 'approver'] }] })
    expect((await (await server.signedIn(teamEmails.checker)).get(`/api/systems/${system.id}`)).status).toBe(200)
  })

  it('must have accounts, stand once, and have an engineer among them', async () => {
    const system = await fresh()
    const put = (members: unknown) => engineer.put(`/api/systems/${system.id}/members`, { members })
    const own = { email: teamEmails.engineer, roles: ['engineer'] }
    expect(await put([own, { email: 'nobody@example.org', roles: ['checker'] }])).toMatchObject({ status: 400, body: { error: { path: 'members[1].email' } } })
    expect(await put([own, own])).toMatchObject({ status: 400, body: { error: { path: 'members[1].email' } } })
    expect(await put([{ email: teamEmails.engineer, roles: ['owner'] }])).toMatchObject({ status: 400, body: { error: { path: 'members[0].roles[0]' } } })
    expect(await put([{ email: teamEmails.engineer, roles: ['checker'] }])).toMatchObject({ status: 422, body: { error: { code: 'refused' } } })
    expect((await engineer.get(`/api/systems/${system.id}`)).status).toBe(200)
  })
})

describe('the criteria of a system', () => {
  it('are set as a whole and judge the board at once', async () => {
    const { system } = server.seeded
    const put = (criteria: Criterion[]) => engineer.put<Criterion[]>(`/api/systems/${system.id}/criteria`, { criteria })
    const verdict = async () => (await engineer.get<Board>(`/api/systems/${system.id}/board`)).body.cells[0]?.judgement.rows.find(row => row.quantity === 'gainMargin' && row.direction === 'rise')
    // 1/(s (s + 1)^2) has |L| = 1/2 at w = 1: its gain may rise by 20 log10 2 = 6.0206 dB (closed form: arg L = -180 deg where 2 atan w = 90 deg)
    expect((await put([{ quantity: 'gainMargin', limit: 6 }])).body).toMatchObject([{ quantity: 'gainMargin', limit: 6 }, { limit: null }, { limit: null }, { limit: null }])
    const met = await verdict()
    expect(met).toMatchObject({ verdict: 'met', limit: 6 })
    expect(met?.value).toBeCloseTo(20 * Math.log10(2), 6)
    await put([{ quantity: 'gainMargin', limit: 6.1 }])
    expect(await verdict()).toMatchObject({ verdict: 'not met', limit: 6.1 })
  })

  it('are refused when negative, doubled or of an unknown quantity', async () => {
    const put = (criteria: unknown) => engineer.put(`/api/systems/${server.seeded.system.id}/criteria`, { criteria })
    expect(await put([{ quantity: 'gainMargin', limit: -6 }])).toMatchObject({ status: 400, body: { error: { path: 'criteria[0].limit' } } })
    expect((await put([{ quantity: 'gainMargin', limit: 6 }, { quantity: 'gainMargin', limit: 7 }])).status).toBe(400)
    expect((await put([{ quantity: 'bandwidth', limit: 6 }])).status).toBe(400)
  })
})

describe('the parameters of a system', () => {
  it('are set as a whole, keep their ids, and are refused from an older version', async () => {
    const system = await fresh()
    const condition = await addCondition(system.id, 'K')
    const put = (parameters: unknown[]) => engineer.put<Parameter[]>(`/api/systems/${system.id}/parameters`, { parameters })
    const { body: first } = await put([{ name: 'wz', unit: 'rad/s', notes: '', values: { [condition.id]: 2 } }, { name: 'k', unit: '', notes: '', values: {} }])
    expect(first).toMatchObject([{ name: 'wz', position: 1, values: { [condition.id]: 2 } }, { name: 'k', position: 2, values: {} }])
    const [wz, k] = first as [Parameter, Parameter]
    const entry = ({ id, version, name, unit, notes, values }: Parameter) => ({ id, version, name, unit, notes, values })
    // two parameters may swap names in one go
    const { body: swapped } = await put([{ ...entry(k), name: 'wz' }, { ...entry(wz), name: 'k' }])
    expect(swapped).toMatchObject([{ id: k.id, name: 'wz', version: 2 }, { id: wz.id, name: 'k', version: 2, values: { [condition.id]: 2 } }])
    expect(await put([entry(wz)])).toMatchObject({ status: 409, body: { error: { details: { current: [{ id: k.id }, { id: wz.id }] } } } })
    expect((await put([])).body).toEqual([])
    expect((await put([entry(wz)])).status).toBe(409)
  })

  it('need names that an expression can use, once each, and values in conditions of this system', async () => {
    const system = await fresh()
    const put = (parameters: unknown[]) => engineer.put(`/api/systems/${system.id}/parameters`, { parameters })
    const named = (name: string) => ({ name, unit: '', notes: '', values: {} })
    for (const name of ['', '2k', 'a b', 's', 'z', 'exp', 'k-1']) expect(await put([named(name)])).toMatchObject({ status: 400, body: { error: { path: 'parameters[0].name' } } })
    expect(await put([named('k'), named('k')])).toMatchObject({ status: 400, body: { error: { path: 'parameters[1].name' } } })
    const foreign = server.seeded.condition.id
    expect(await put([{ ...named('k'), values: { [foreign]: 1 } }])).toMatchObject({ status: 400, body: { error: { path: `parameters[0].values.${foreign}` } } })
    expect((await put([{ ...named('k'), values: { x: 1 } }])).status).toBe(400)
    expect((await put([{ ...named('k'), values: { [foreign]: null } }])).status).toBe(400)
  })
})
