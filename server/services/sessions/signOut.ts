import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { SessionRow } from '../../database/models/SessionRow'
import type { OpenContext } from '../context'
import { findSession } from './findSession'

/** Ends the session on the server: the secret is worth nothing from now on, wherever a copy of it may be. */
export async function signOut(secret: string, context: OpenContext): Promise<void> {
  const session = await findSession(secret, context)
  if (session === null) return
  await writeTransaction(async () => {
    await SessionRow.destroy({ where: { idHash: session.idHash } })
    await recordAudit({ ...context, actor: session.actor }, 'signed out')
  })
}
