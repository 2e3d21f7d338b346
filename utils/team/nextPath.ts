/** Only ever resolved against: what does not stay on it leads to another site. */
const HERE = 'http://here.invalid'

/**
 * Where to go after signing in: the wanted path when it is one of this site, else the library. Another site's address
 * (also as `//site` or `/\site`, which browsers take for one) and the sign-in page itself are refused.
 */
export function nextPath(wanted: unknown): string {
  if (typeof wanted !== 'string' || !wanted.startsWith('/') || !URL.canParse(wanted, HERE)) return '/'
  const url = new URL(wanted, HERE)
  if (url.origin !== HERE || url.pathname.startsWith('//') || url.pathname === '/sign-in') return '/'
  return url.pathname + url.search + url.hash
}
