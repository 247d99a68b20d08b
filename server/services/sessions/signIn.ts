import { Op } from 'sequelize'
import { AppError } from '#shared/errors/AppError'
import { verifyAgainstNobody, verifyPassword } from '../../adapters/passwordHash'
import { hashOfSecret, newSecret } from '../../adapters/secretToken'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { SessionRow } from '../../database/models/SessionRow'
import { nowOf, type OpenContext } from '../context'
import { SignInLimiter } from './SignInLimiter'
import { sessionLife } from './sessionLife'

const byAccount = new SignInLimiter(5)
/** A whole address is slowed down later than one account from it: many people may share it. */
const byAddress = new SignInLimiter(50)

/**
 * Opens a new session and returns its secret, to be handed to the browser and stored nowhere. A wrong password, an unknown
 * person and a disabled one get the same answer in the same time. Throws 'signed out', or 'too many tries' with the wait.
 */
export async function signIn(fields: { email: string, password: string }, address: string, context: OpenContext): Promise<{ secret: string, maxAge: number }> {
  const account = `${fields.email} ${address}`
  await byAddress.assertMayTry(address)
  // Counted before the password is looked at, so that many guesses sent at once are no way round the wait.
  await byAccount.take(account)
  const person = await PersonRow.findOne({ where: { email: fields.email } })
  const fits = person?.passwordHash ? await verifyPassword(person.passwordHash, fields.password) : await verifyAgainstNobody(fields.password)
  if (!fits || person === null || person.disabledAt !== null) {
    await byAddress.count(address)
    await writeTransaction(() => recordAudit(context, 'sign-in refused', { payload: { address, knownPersonId: person?.id ?? null } }))
    throw new AppError('signedOut', 'The e-mail address and the password do not fit together.')
  }
  await byAccount.forget(account)
  const secret = newSecret()
  await writeTransaction(async () => {
    await SessionRow.destroy({ where: { expiresAt: { [Op.lte]: nowOf(context) } } })
    await SessionRow.create({
      idHash: hashOfSecret(secret),
      personId: person.id,
      createdAt: nowOf(context),
      lastSeenAt: nowOf(context),
      expiresAt: new Date(context.clock().getTime() + sessionLife.absolute).toISOString(),
    })
    await recordAudit({ ...context, actor: person }, 'signed in', { payload: { address } })
  })
  return { secret, maxAge: sessionLife.absolute / 1000 }
}
