import { resetRequestSchema } from '#shared/schemas/signIn'
import { addressOf } from '../../http/addressOf'
import { requestReset } from '../../services/passwords/requestReset'

/** POST /api/auth/reset-request: sends a reset link if the address has an account; the answer does not tell. */
export default defineApiHandler('POST /api/auth/reset-request', { body: resetRequestSchema }, async ({ event, body, context }) => {
  await requestReset(body.email, addressOf(event), context)
  return {}
})
