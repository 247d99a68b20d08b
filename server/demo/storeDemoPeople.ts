import { hashPassword } from '../adapters/passwordHash'
import { writeTransaction } from '../database/database'
import { PersonRow } from '../database/models/PersonRow'
import type { Actor } from '../services/context'
import accounts from './accounts.json'

/** Gives the people of the demo their accounts, with the password that `npm start` prints. Returns them by e-mail. */
export async function storeDemoPeople(now: Date): Promise<Map<string, Actor>> {
  const passwordHash = await hashPassword(accounts.password)
  return writeTransaction(async () => {
    const actors = new Map<string, Actor>()
    for (const { email, name, isAdministrator } of accounts.people) {
      const { id } = await PersonRow.create({ email, name, isAdministrator, passwordHash, disabledAt: null, createdAt: now.toISOString() })
      actors.set(email, { id, email, name, isAdministrator })
    }
    return actors
  })
}
