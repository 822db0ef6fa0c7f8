import { loadPerson } from '@/db/queries/users'
import type { Database } from '@/db/tables/database'
import { withUser } from '@/db/with-organisation'
import type { Role } from '@/lib/shared/permissions'
import type { Actor } from '../../context'
import { isId } from '../ids'
import { sameStamp, sessionStamp } from './session-stamp'

/** What the cookie holds. */
export interface SessionClaim {
  userId: string
  organisationId: string
  stamp: string
}

export interface MembershipView {
  organisationId: string
  organisation: string
  kind: 'shop' | 'school' | 'both'
  role: Role
}

export interface Session {
  actor: Actor
  /** All of the person's, the one they work in included. */
  memberships: MembershipView[]
}

/** Who a claim stands for now, by the database; null when it stands for nobody any more. */
export async function openSession(
  db: Database,
  secret: string,
  claim: SessionClaim,
): Promise<Session | null> {
  if (!isId(claim.userId) || !isId(claim.organisationId)) return null
  const person = await withUser(db, claim.userId, (trx) => loadPerson(trx, claim.userId))
  const chosen = person?.memberships.find((membership) => membership.id === claim.organisationId)
  if (!person || !chosen) return null
  const { user, memberships } = person
  if (!sameStamp(claim.stamp, stampOf(secret, user, chosen))) return null
  return {
    actor: {
      userId: user.id,
      name: user.name,
      email: user.email,
      organisationId: chosen.id,
      organisation: chosen.name,
      role: chosen.role,
    },
    memberships: memberships.map(({ id, name, kind, role }) => ({
      organisationId: id,
      organisation: name,
      kind,
      role,
    })),
  }
}

type Person = NonNullable<Awaited<ReturnType<typeof loadPerson>>>

export function stampOf(
  secret: string,
  user: Person['user'],
  membership: Person['memberships'][number],
): string {
  return sessionStamp(secret, {
    userId: user.id,
    passwordHash: user.password_hash,
    organisationId: membership.id,
    role: membership.role,
    memberSince: membership.since,
  })
}
