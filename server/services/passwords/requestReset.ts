import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { resetMessage } from '../../mail/messages/resetMessage'
import { queueMail } from '../../mail/queueMail'
import type { OpenContext } from '../context'
import { SignInLimiter } from '../sessions/SignInLimiter'
import { issueToken } from './issueToken'

const byAccount = new SignInLimiter(5)

/**
 * Sends a reset link to an account that has a password. Says nothing of whether there is one; throws only 'too many tries'.
 */
export async function requestReset(email: string, address: string, context: OpenContext): Promise<void> {
  await byAccount.take(`${email} ${address}`)
  await writeTransaction(async () => {
    const person = await PersonRow.findOne({ where: { email } })
    // Noted for nobody too: the time that a write takes would tell the two apart.
    await recordAudit({ ...context, actor: person }, 'password reset asked for', { ...(person && { subjectId: person.id }), payload: { address } })
    if (person === null || person.passwordHash === null || person.disabledAt !== null) return
    const token = await issueToken(person.id, 'reset', context)
    await queueMail(person, resetMessage(person, token), context)
  })
}
