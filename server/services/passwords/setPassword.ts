import { AppError } from '#shared/errors/AppError'
import { hashPassword } from '../../adapters/passwordHash'
import { hashOfSecret } from '../../adapters/secretToken'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { PersonToken } from '../../database/models/PersonToken'
import { SessionRow } from '../../database/models/SessionRow'
import { nowOf, type OpenContext } from '../context'

const spent = () => new AppError('gone', 'This link has been used or is too old. Ask for a new one on the sign-in page, or ask your administrator for a new invitation.', { path: 'token' })

/** The token and its person, if the link is still good. */
async function findOpenToken(token: string, context: OpenContext): Promise<{ row: PersonToken, person: PersonRow }> {
  const row = await PersonToken.findOne({ where: { tokenHash: hashOfSecret(token) } })
  if (row === null || row.usedAt !== null || context.clock().getTime() >= Date.parse(row.expiresAt)) throw spent()
  const person = await PersonRow.findByPk(row.personId)
  if (person === null || person.disabledAt !== null) throw spent()
  return { row, person }
}

/**
 * Sets a person's password by the link it was sent (invitation or reset), once, and ends every session it had.
 * Throws 'gone' where the link has been used, is too old or never was.
 */
export async function setPassword(fields: { token: string, password: string }, context: OpenContext): Promise<void> {
  await findOpenToken(fields.token, context)
  const passwordHash = await hashPassword(fields.password)
  await writeTransaction(async () => {
    // Asked again inside: of two requests with one link the first wins.
    const { row, person } = await findOpenToken(fields.token, context)
    await row.update({ usedAt: nowOf(context) })
    await person.update({ passwordHash })
    await SessionRow.destroy({ where: { personId: person.id } })
    // Links sent before are void as well: one way in is enough.
    await PersonToken.update({ usedAt: nowOf(context) }, { where: { personId: person.id, usedAt: null } })
    await recordAudit({ ...context, actor: person }, 'password set', { subjectId: person.id, payload: { by: row.purpose } })
  })
}
