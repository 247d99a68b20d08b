import { hashOfSecret } from '../../adapters/secretToken'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { SessionRow } from '../../database/models/SessionRow'
import type { Actor, OpenContext } from '../context'
import { nowOf } from '../context'
import { sessionLife } from './sessionLife'

/** ms; last use is noted no more often than this, so that reading does not write each time */
const noteEvery = 60_000

/** The session that a cookie's secret stands for; null where it never was, has ended, or its person is disabled. */
export async function findSession(secret: string, context: OpenContext): Promise<{ actor: Actor, idHash: string } | null> {
  const idHash = hashOfSecret(secret)
  const session = await SessionRow.findByPk(idHash)
  if (session === null) return null
  const now = context.clock().getTime()
  if (now >= Date.parse(session.expiresAt) || now >= Date.parse(session.lastSeenAt) + sessionLife.idle) return null
  const person = await PersonRow.findByPk(session.personId)
  if (person === null || person.disabledAt !== null) return null
  if (now >= Date.parse(session.lastSeenAt) + noteEvery) {
    await writeTransaction(() => SessionRow.update({ lastSeenAt: nowOf(context) }, { where: { idHash } }))
  }
  const { id, name, email, isAdministrator } = person
  return { actor: { id, name, email, isAdministrator }, idHash }
}
