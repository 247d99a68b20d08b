import { AppError } from '#shared/errors/AppError'
import type { NewPerson } from '#shared/schemas/person'
import type { Person } from '#shared/types/person'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { invitationMessage } from '../../mail/messages/invitationMessage'
import { queueMail } from '../../mail/queueMail'
import { presentPerson } from '../../presenters/presentPerson'
import { nowOf, type ServiceContext } from '../context'
import { issueToken } from '../passwords/issueToken'

/** Makes an account without a password and sends the link that sets it. Throws 'conflict' where the address has one. */
export function invitePerson(fields: NewPerson, context: ServiceContext): Promise<Person> {
  return writeTransaction(async () => {
    if (await PersonRow.count({ where: { email: fields.email } }) > 0) throw new AppError('conflict', 'There is an account with this e-mail address.', { path: 'email' })
    const person = await PersonRow.create({ ...fields, passwordHash: null, disabledAt: null, createdAt: nowOf(context) })
    await recordAudit(context, 'person invited', { subjectId: person.id, payload: { email: person.email, isAdministrator: person.isAdministrator } })
    await queueMail(person, invitationMessage(person, context.actor.name, await issueToken(person.id, 'invitation', context)), context)
    return presentPerson(person)
  })
}
