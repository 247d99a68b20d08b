import { hashOfSecret, newSecret } from '../../adapters/secretToken'
import { PersonToken } from '../../database/models/PersonToken'
import { nowOf, type OpenContext } from '../context'
import { tokenLife } from './tokenLife'

/**
 * A new secret for a link that sets this person's password once. Earlier links of the same purpose are good no longer.
 * To be called in the transaction of its reason.
 */
export async function issueToken(personId: number, purpose: 'invitation' | 'reset', context: OpenContext): Promise<string> {
  const secret = newSecret()
  await PersonToken.update({ usedAt: nowOf(context) }, { where: { personId, purpose, usedAt: null } })
  await PersonToken.create({
    personId,
    purpose,
    tokenHash: hashOfSecret(secret),
    createdAt: nowOf(context),
    expiresAt: new Date(context.clock().getTime() + tokenLife[purpose]).toISOString(),
    usedAt: null,
  })
  return secret
}
