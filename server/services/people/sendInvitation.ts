import { AppError } from '#shared/errors/AppError'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { invitationMessage } from '../../mail/messages/invitationMessage'
import { queueMail } from '../../mail/queueMail'
import type { ServiceContext } from '../context'
import { issueToken } from '../passwords/issueToken'
import { findPerson } from './findPerson'

/** Sends a new invitation link; the former one is good no longer. Throws 'refused' once the person has a password. */
export async function sendInvitation(personId: number, context: ServiceContext): Promise<void> {
  await writeTransaction(async () => {
    const person = await findPerson(personId)
    if (person.passwordHash !== null) throw new AppError('refused', `${person.name} has a password already and can ask for a new one on the sign-in page.`)
    if (person.disabledAt !== null) throw new AppError('refused', `The account of ${person.name} is disabled. Enable it first.`)
    await recordAudit(context, 'invitation sent again', { subjectId: person.id })
    await queueMail(person, invitationMessage(person, context.actor.name, await issueToken(person.id, 'invitation', context)), context)
  })
}
