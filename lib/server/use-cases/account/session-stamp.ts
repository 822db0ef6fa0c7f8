import { createHmac, timingSafeEqual } from 'node:crypto'

export interface BehindSession {
  userId: string
  passwordHash: string
  organisationId: string
  role: string
  memberSince: Date
}

/**
 * A digest of all that a session rests on. It is kept in the cookie and made anew from the database with every
 * request: once the password, the membership or its role changed, the two differ and the session is worth nothing.
 */
export function sessionStamp(secret: string, behind: BehindSession): string {
  const { userId, passwordHash, organisationId, role, memberSince } = behind
  return createHmac('sha256', secret)
    .update(JSON.stringify([userId, passwordHash, organisationId, role, memberSince.toISOString()]))
    .digest('base64url')
}

export function sameStamp(one: string, other: string): boolean {
  const [a, b] = [Buffer.from(one), Buffer.from(other)]
  return a.length === b.length && timingSafeEqual(a, b)
}
