import type { SessionReply } from '#shared/types/person'
import { hashOfSecret } from '../../adapters/secretToken'
import { MembershipRow } from '../../database/models/MembershipRow'
import { PersonRow } from '../../database/models/PersonRow'
import { SystemRow } from '../../database/models/SystemRow'
import { logger } from '../../log/logger'
import { presentPerson } from '../../presenters/presentPerson'
import type { OpenContext } from '../context'
import { findSession } from './findSession'

/** The last answers given, oldest first: what is said while the database cannot be asked. */
const lastReplies = new Map<string, SessionReply>()
const mostReplies = 1000

/**
 * Who is signed in, and with which roles; null where nobody is. A failing database never signs anybody out: the sign-in module
 * drops its state at any answer but a good one, so the last good answer is given again, and routes that act still refuse.
 */
export async function readSession(secret: string, context: OpenContext): Promise<SessionReply | null> {
  const idHash = hashOfSecret(secret)
  try {
    const session = await findSession(secret, context)
    if (session === null) {
      lastReplies.delete(idHash)
      return null
    }
    const [person, memberships] = await Promise.all([
      PersonRow.findByPk(session.actor.id, { rejectOnEmpty: true }),
      liveMemberships(session.actor.id),
    ])
    const reply = { person: presentPerson(person), memberships }
    lastReplies.delete(idHash)
    lastReplies.set(idHash, reply)
    for (const oldest of lastReplies.keys()) {
      if (lastReplies.size <= mostReplies) break
      lastReplies.delete(oldest)
    }
    return reply
  }
  catch (error) {
    logger.error({ err: error }, 'The session could not be read from the database.')
    return lastReplies.get(idHash) ?? null
  }
}

async function liveMemberships(personId: number): Promise<SessionReply['memberships']> {
  const rows = await MembershipRow.findAll({ where: { personId } })
  const live = new Set((await SystemRow.findAll({ where: { id: rows.map(row => row.systemId) }, attributes: ['id'] })).map(system => system.id))
  return rows.filter(row => live.has(row.systemId)).map(({ systemId, role }) => ({ personId, systemId, role }))
}
