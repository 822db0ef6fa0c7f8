import { loadPerson } from '@/db/queries/users'
import { withUser } from '@/db/with-organisation'
import { chooseMembershipSchema } from '@/lib/shared/api/account'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { parseInput } from '../parse'
import { type SessionClaim, stampOf } from './open-session'

/** The claim for working in another of one's organisations. */
export async function chooseMembership(
  { db, actor }: Context,
  input: unknown,
  { secret }: { secret: string },
): Promise<Result<SessionClaim>> {
  const parsed = parseInput(chooseMembershipSchema, input)
  if (!parsed.ok) return parsed
  const person = await withUser(db, actor.userId, (trx) => loadPerson(trx, actor.userId))
  const chosen = person?.memberships.find(({ id }) => id === parsed.value.organisationId)
  if (!person || !chosen) return fail('not-found')
  return succeed({
    userId: actor.userId,
    organisationId: chosen.id,
    stamp: stampOf(secret, person.user, chosen),
  })
}
