import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { routeActions, type RouteKey } from '#shared/access/routeActions'
import { can, type AccessFacts } from '#shared/access/rules'
import { storeUpload } from '#server/services/uploads/storeUpload'
import { buildBlock, typed } from '../factories/buildBlock'
import { buildSnapshot } from '../factories/buildSnapshot'
import { contextOf } from '../factories/contextOf'
import { seedReport } from '../factories/seedReport'
import { seedTeam, teamEmails } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { routeKeysOfFiles } from './routeFiles'
import { startServer, type TestServer } from './startServer'

/**
 * Every route, as the files under server/api have it, asked by everyone. What is expected follows from the rule table alone: who may, gets past
 * the guard (whatever the route then says of an empty request); who may not, is stopped with the right word.
 */
const standings: Record<keyof typeof teamEmails | 'signedOut', AccessFacts> = {
  signedOut: { signedIn: false, isAdministrator: false, roles: [] },
  engineer: { signedIn: true, isAdministrator: false, roles: ['engineer'] },
  checker: { signedIn: true, isAdministrator: false, roles: ['checker'] },
  approver: { signedIn: true, isAdministrator: false, roles: ['approver'] },
  customer: { signedIn: true, isAdministrator: false, roles: ['customer'] },
  administrator: { signedIn: true, isAdministrator: true, roles: [] },
  outsider: { signedIn: true, isAdministrator: false, roles: [] },
}

type Standing = keyof typeof standings

async function seed() {
  const team = await seedTeam()
  const { system, loop, condition, people } = team
  const report = await seedReport(system.id, [loop.id], [condition.id], buildSnapshot(), people.engineer, people.approver)
  const block = await buildBlock(system.id, contextOf(people.engineer), 'G', typed('1/s'))
  const upload = await storeUpload(system.id, { name: 'sweep.csv', bytes: Buffer.from('f,re,im\n') }, contextOf(people.engineer))
  return { ...team, ...report, block, uploadId: upload.id }
}

let server: TestServer & { seeded: Awaited<ReturnType<typeof seed>> }
const callers = new Map<Standing, ApiCaller>()
beforeAll(async () => {
  server = await startServer({ seed })
  callers.set('signedOut', server.stranger())
  for (const standing of Object.keys(teamEmails) as (keyof typeof teamEmails)[]) callers.set(standing, await server.signedIn(teamEmails[standing]))
})
afterAll(() => server.stop())

/** The route's address with ids of rows that all belong to the seeded system. */
function addressOf(key: string): string {
  const { system, loop, condition, source, block, people, reportId, revisionId, jobId, uploadId } = server.seeded
  const params: Record<string, number | string> = {
    systemId: system.id, loopId: loop.id, conditionId: condition.id, sourceId: source.id, blockId: block.id, personId: people.outsider.id,
    reportId, revisionId, otherId: revisionId, jobId, uploadId, kind: 'html',
  }
  return key.replace(/^\w+ /, '').replace(/\[(\w+)\]/g, (_, name: string) => {
    if (!(name in params)) throw new Error(`The matrix does not know what to put in the place of [${name}].`)
    return String(params[name])
  })
}

async function ask(standing: Standing, key: string): Promise<number> {
  const caller = callers.get(standing) as ApiCaller
  const [method] = key.split(' ') as [string]
  const { status } = await caller.call(method, addressOf(key))
  // What a permitted request did is undone, so that the next one finds the same rows.
  if (status === 200 && key === 'POST /api/auth/sign-out' && standing !== 'signedOut') await caller.signIn(teamEmails[standing])
  if (status === 200 && method === 'DELETE' && `POST ${key.slice(7)}/restore` in routeActions) await caller.post(`${addressOf(key)}/restore`)
  return status
}

/** The status with which the guard must stop this person; null where it must let them through. */
function refusalOf(standing: Standing, key: RouteKey): number | null {
  const facts = standings[standing]
  // Anybody may ask who is signed in; where nobody is, this very answer says so.
  if (key === 'GET /api/auth/session' && !facts.signedIn) return 401
  if (can(routeActions[key], facts)) return null
  if (!facts.signedIn) return 401
  const isOfSystem = /\[(?!person)\w+Id\]/.test(key)
  return isOfSystem && facts.roles.length === 0 && !facts.isAdministrator ? 404 : 403
}

describe('the routes under server/api', () => {
  it('are just those that have a rule', () => {
    expect(routeKeysOfFiles()).toEqual(Object.keys(routeActions).sort())
  })

  it.each(Object.keys(standings) as Standing[])('stop the %s where the rules do, with the right word, and only there', async (standing) => {
    const wrong: string[] = []
    for (const key of routeKeysOfFiles() as RouteKey[]) {
      const status = await ask(standing, key)
      const refusal = refusalOf(standing, key)
      const isRight = refusal === null ? ![401, 403, 404].includes(status) && status < 500 : status === refusal
      if (!isRight) wrong.push(`${key}: answered ${status}, expected ${refusal ?? 'to be let through'}`)
    }
    expect(wrong).toEqual([])
  })

  it('answer an outsider alike for what exists and what does not', async () => {
    const outsider = callers.get('outsider') as ApiCaller
    const known = await outsider.get(`/api/loops/${server.seeded.loop.id}`)
    const unknown = await outsider.get('/api/loops/4711')
    expect({ status: known.status, body: known.body }).toEqual({ status: unknown.status, body: unknown.body })
  })

  it('do not find what is addressed by something that is no id', async () => {
    const engineer = callers.get('engineer') as ApiCaller
    for (const id of ['0', '-1', '1e3', '1.5', 'one', '%00', '9007199254740993', '1%20OR%201=1']) expect((await engineer.get(`/api/systems/${id}`)).status).toBe(404)
  })
})
