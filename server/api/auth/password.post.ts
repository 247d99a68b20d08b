import { passwordSchema } from '#shared/schemas/signIn'
import { setPassword } from '../../services/passwords/setPassword'

/** POST /api/auth/password: sets a password with the secret of an invitation or reset link. */
export default defineApiHandler('POST /api/auth/password', { body: passwordSchema }, async ({ body, context }) => {
  await setPassword(body, context)
  return {}
})
