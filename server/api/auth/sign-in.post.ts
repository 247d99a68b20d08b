import { signInSchema } from '#shared/schemas/signIn'
import { addressOf } from '../../http/addressOf'
import { readSessionCookie, writeSessionCookie } from '../../http/sessionCookie'
import { signIn } from '../../services/sessions/signIn'
import { signOut } from '../../services/sessions/signOut'

/** POST /api/auth/sign-in: sets the session cookie. What the sign-in module keeps of it is a marker and no secret. */
export default defineApiHandler('POST /api/auth/sign-in', { body: signInSchema }, async ({ event, body, context }) => {
  const { secret, maxAge } = await signIn(body, addressOf(event), context)
  const former = readSessionCookie(event)
  if (former !== undefined) await signOut(former, context)
  writeSessionCookie(event, secret, maxAge)
  return { token: 'cookie-session' }
})
