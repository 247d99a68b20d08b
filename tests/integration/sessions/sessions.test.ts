import { readFileSync } from 'node:fs'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeDatabase, openDatabase, writeTransaction } from '#server/database/database'
import { PersonRow } from '#server/database/models/PersonRow'
import { SessionRow } from '#server/database/models/SessionRow'
import { hashOfSecret } from '#server/adapters/secretToken'
import type { Actor } from '#server/services/context'
import { findSession } from '#server/services/sessions/findSession'
import { readSession } from '#server/services/sessions/readSession'
import { signIn } from '#server/services/sessions/signIn'
import { buildPerson, testPassword } from '../../factories/buildPerson'
import { openTestDatabase } from '../../factories/openTestDatabase'

let opened: Awaited<ReturnType<typeof openTestDatabase>>
let person: Actor
beforeAll(async () => {
  opened = await openTestDatabase()
  person = await buildPerson()
})
afterAll(() => opened.close())

const at = (time: string) => ({ actor: null, clock: () => new Date(time) })
const signInAt = (time: string) => signIn({ email: person.email, password: testPassword }, '192.0.2.1', at(time))

describe('a session', () => {
  it('ends an hour after the last request', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00Z')
    expect(await findSession(secret, at('2026-12-01T08:59:59Z'))).toMatchObject({ actor: { id: person.id } })
    expect(await findSession(secret, at('2026-12-01T09:59:58Z'))).not.toBeNull()
    expect(await findSession(secret, at('2026-12-01T10:59:58Z'))).toBeNull()
  })

  it('ends twelve hours after signing in, however busy', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00Z')
    for (let minutes = 30; minutes < 720; minutes += 30) {
      expect(await findSession(secret, at(new Date(Date.parse('2026-12-01T08:00:00Z') + minutes * 60_000).toISOString()))).not.toBeNull()
    }
    expect(await findSession(secret, at('2026-12-01T20:00:00Z'))).toBeNull()
  })

  it('does not write at every request, only when a minute has passed', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00.000Z')
    const lastSeen = async () => (await SessionRow.findByPk(hashOfSecret(secret)))?.lastSeenAt
    await findSession(secret, at('2026-12-01T08:00:59Z'))
    expect(await lastSeen()).toBe('2026-12-01T08:00:00.000Z')
    await findSession(secret, at('2026-12-01T08:01:00Z'))
    expect(await lastSeen()).toBe('2026-12-01T08:01:00.000Z')
  })

  it('is not that of a disabled person', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00Z')
    await writeTransaction(() => PersonRow.update({ disabledAt: '2026-12-01T08:00:01.000Z' }, { where: { id: person.id } }))
    expect(await findSession(secret, at('2026-12-01T08:01:00Z'))).toBeNull()
    await expect(signInAt('2026-12-01T08:02:00Z')).rejects.toMatchObject({ code: 'signedOut' })
    await writeTransaction(() => PersonRow.update({ disabledAt: null }, { where: { id: person.id } }))
  })

  it('that has ended is cleared away when the next begins', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00Z')
    await signInAt('2026-12-02T08:00:00Z')
    expect(await SessionRow.findByPk(hashOfSecret(secret))).toBeNull()
  })

  it('leaves no secret in the database', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00Z')
    const stored = readFileSync(opened.file, 'latin1') + readFileSync(`${opened.file}-wal`, 'latin1')
    expect(stored).toContain(hashOfSecret(secret))
    expect(stored).not.toContain(secret)
    expect(stored).not.toContain(testPassword)
  })

  it('is still told while the database does not answer, so that nobody is signed out by a fault', async () => {
    const { secret } = await signInAt('2026-12-01T08:00:00Z')
    const context = at('2026-12-01T08:00:30Z')
    const known = await readSession(secret, context)
    expect(known).toMatchObject({ person: { email: person.email } })
    await closeDatabase()
    try {
      expect(await readSession(secret, context)).toEqual(known)
      expect(await readSession('a secret never seen', context)).toBeNull()
    }
    finally {
      openDatabase(opened.file)
    }
  })
})

describe('guessing', () => {
  it('is slowed down though all guesses are sent at once', async () => {
    const guesses = await Promise.allSettled(Array.from({ length: 30 }, (_, index) => signIn({ email: person.email, password: `guess ${index}` }, '192.0.2.66', at('2026-12-01T08:00:00Z'))))
    const codes = guesses.map(guess => guess.status === 'rejected' ? (guess.reason as { code: string }).code : 'let in')
    expect(codes.filter(code => code === 'signedOut').length).toBeLessThanOrEqual(6)
    expect(codes.filter(code => code === 'tooManyTries').length).toBeGreaterThanOrEqual(24)
    // the owner, elsewhere, is not held up
    await signInAt('2026-12-01T08:00:01Z')
  })
})
