import { publicAddress } from '../adapters/publicAddress'

/** The link that sets a password; its secret is exchanged by a POST from the page it opens. */
export function passwordLink(token: string): string {
  const link = new URL('/password', publicAddress())
  link.searchParams.set('token', token)
  return link.href
}
