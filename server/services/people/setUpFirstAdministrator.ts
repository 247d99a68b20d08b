import { AppError } from '#shared/errors/AppError'
import { hashPassword } from '../../adapters/passwordHash'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { nowOf, type OpenContext } from '../context'

/** Whether nobody has an account yet. */
export const needsFirstAdministrator = async (): Promise<boolean> => await PersonRow.count() === 0

/** Makes the first account, an administrator's. Throws 'not allowed' as soon as anybody has one. */
export async function setUpFirstAdministrator(fields: { name: string, email: string, password: string }, context: OpenContext): Promise<void> {
  const refuse = () => new AppError('notAllowed', 'There are accounts already: ask an administrator to invite you.')
  if (!await needsFirstAdministrator()) throw refuse()
  const passwordHash = await hashPassword(fields.password)
  await writeTransaction(async () => {
    if (!await needsFirstAdministrator()) throw refuse()
    const person = await PersonRow.create({ email: fields.email, name: fields.name, passwordHash, isAdministrator: true, disabledAt: null, createdAt: nowOf(context) })
    await recordAudit({ ...context, actor: person }, 'first administrator set up', { subjectId: person.id })
  })
}
