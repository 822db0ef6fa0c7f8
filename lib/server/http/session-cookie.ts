import { decode, encode } from 'next-auth/jwt'
import type { Database } from '@/db/tables/database'
import { env } from '../env'
import { openSession, type Session, type SessionClaim } from '../use-cases/account/open-session'

/** A week: a tablet in the bay is not asked every morning, and a lost one is out at the next change of password. */
export const sessionSeconds = 7 * 24 * 3600

export function isSecure(): boolean {
  return env().NEXTAUTH_URL?.startsWith('https://') ?? false
}

/** The name that next-auth reads and writes. */
export function sessionCookieName(): string {
  return `${isSecure() ? '__Secure-' : ''}next-auth.session-token`
}

export function sealSession(claim: SessionClaim, person: { name: string; email: string }): Promise<string> {
  return encode({
    secret: env().NEXTAUTH_SECRET,
    maxAge: sessionSeconds,
    token: {
      sub: claim.userId,
      organisationId: claim.organisationId,
      stamp: claim.stamp,
      name: person.name,
      email: person.email,
    },
  })
}

/** Who a cookie stands for, asked of the database every time; null when for nobody. */
export async function sessionOfCookie(db: Database, cookie: string | undefined): Promise<Session | null> {
  if (!cookie) return null
  const secret = env().NEXTAUTH_SECRET
  // A cookie that somebody made up, or that an older secret signed, is no cookie.
  const token = await decode({ token: cookie, secret }).catch(() => null)
  const claim = claimOf(token)
  return claim ? openSession(db, secret, claim) : null
}

export function claimOf(token: Record<string, unknown> | null): SessionClaim | null {
  const { sub, organisationId, stamp } = token ?? {}
  if (typeof sub !== 'string' || typeof organisationId !== 'string' || typeof stamp !== 'string') return null
  return { userId: sub, organisationId, stamp }
}
