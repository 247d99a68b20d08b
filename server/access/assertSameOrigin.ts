import { AppError } from '#shared/errors/AppError'
import { publicAddress } from '../adapters/publicAddress'

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * Refuses a change that another site's page asked for with this person's cookie. A browser says where a request comes
 * from; what says nothing is refused too, so that the rule cannot be met by leaving headers out.
 */
export function assertSameOrigin(request: { method: string, header: (name: string) => string | undefined }): void {
  if (safeMethods.has(request.method)) return
  const site = request.header('sec-fetch-site')
  if (site === 'same-origin' || site === 'none') return
  const origin = request.header('origin')
  if (site === undefined && origin !== undefined && isOwn(origin, request.header('host'))) return
  throw new AppError('notAllowed', 'Changes are only taken from the pages of this application.')
}

/** Whether an origin is the address this application is served at: as configured, or as the request was addressed. */
function isOwn(origin: string, host: string | undefined): boolean {
  if (!URL.canParse(origin)) return false
  const url = new URL(origin)
  return url.origin === publicAddress().origin || (host !== undefined && url.host === host)
}
