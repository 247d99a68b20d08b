import { hashPassword } from '#server/adapters/passwordHash'
import { PersonRow } from '#server/database/models/PersonRow'
import type { Actor } from '#server/services/context'

/** What every person in tests signs in with. */
export const testPassword = 'correct horse battery'

let hash: Promise<string> | undefined
let count = 0

/** A person with an account, a password and no role anywhere. */
export async function buildPerson(fields: { name?: string, email?: string, isAdministrator?: boolean } = {}): Promise<Actor> {
  hash ??= hashPassword(testPassword)
  const number = ++count
  const { id, name, email, isAdministrator } = await PersonRow.create({
    name: fields.name ?? `Person ${number}`,
    email: fields.email ?? `person${number}@example.org`,
    isAdministrator: fields.isAdministrator ?? false,
    passwordHash: await hash,
    disabledAt: null,
    createdAt: '2026-12-01T08:00:00.000Z',
  })
  return { id, name, email, isAdministrator }
}
