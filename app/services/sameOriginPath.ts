/** The path to return to after signing in: `value` where it is a path of this very site, '/systems' otherwise. */
export function sameOriginPath(value: unknown): string {
  const home = '/systems'
  if (typeof value !== 'string' || !value.startsWith('/')) return home
  const base = 'http://own.invalid'
  if (!URL.canParse(value, base)) return home
  const url = new URL(value, base)
  if (url.origin !== base || url.pathname.startsWith('//') || url.pathname === '/sign-in') return home
  return url.pathname + url.search + url.hash
}
