import { clearSessionCookie, readSessionCookie } from '../../http/sessionCookie'
import { signOut } from '../../services/sessions/signOut'

/** POST /api/auth/sign-out: ends the session on the server and in the browser. */
export default defineApiHandler('POST /api/auth/sign-out', {}, async ({ event, context }) => {
  const secret = readSessionCookie(event)
  if (secret !== undefined) await signOut(secret, context)
  clearSessionCookie(event)
  return {}
})
