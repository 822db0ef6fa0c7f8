import { env } from '../env'

/** False for a request that a page of another site made with the visitor's cookie. */
export function isSameOrigin(request: Request): boolean {
  const site = request.headers.get('sec-fetch-site')
  if (site === 'cross-site' || site === 'same-site') return false
  const origin = request.headers.get('origin')
  // Programs send neither header; a browser always sends one of them with a write.
  if (origin === null) return true
  const host = request.headers.get('x-forwarded-host') ?? request.headers.get('host')
  const own = env().NEXTAUTH_URL
  return (own !== undefined && origin === new URL(own).origin) || (host !== null && hostOf(origin) === host)
}

function hostOf(origin: string): string | null {
  return URL.canParse(origin) ? new URL(origin).host : null
}
