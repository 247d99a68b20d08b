import { AppError } from '#shared/errors/AppError'
import { readSessionCookie } from '../../http/sessionCookie'
import { readSession } from '../../services/sessions/readSession'

/** GET /api/auth/session: the person signed in with its roles; 401 only where nobody is, never 5xx. */
export default defineApiHandler('GET /api/auth/session', {}, async ({ event, context }) => {
  const secret = readSessionCookie(event)
  const session = secret === undefined ? null : await readSession(secret, context)
  if (session === null) throw new AppError('signedOut', 'Nobody is signed in.')
  return session
})
