/** Set by the proxy on requests for pages behind the sign-in: the path and query that were asked for. */
export const askedPathHeader = 'x-halfsplit-asked-path'

const home = '/circuits'

/** Where to go after signing in: a page of this product, whatever the address asked for. */
export function wayBack(to: unknown): string {
  if (typeof to !== 'string' || !to.startsWith('/')) return home
  // "//host" and "/\host" lead elsewhere: resolve as a browser does and see whether the host stays.
  try {
    const base = 'http://halfsplit.invalid'
    const url = new URL(to, base)
    return url.origin === base ? `${url.pathname}${url.search}${url.hash}` : home
  } catch {
    return home
  }
}
