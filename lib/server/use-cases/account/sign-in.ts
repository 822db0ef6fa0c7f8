import { createHash } from 'node:crypto'
import { noteAttempt, noteSuccess } from '@/db/queries/sign-in-attempts'
import { findUserByEmail, loadPerson } from '@/db/queries/users'
import { withUser } from '@/db/with-organisation'
import { signInSchema } from '@/lib/shared/api/account'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { OpenContext } from '../../context'
import { parseInput } from '../parse'
import { type SessionClaim, stampOf } from './open-session'
import { checkPassword } from './password'

/** Failed attempts allowed in the window: for one account from anywhere, and from one address for all accounts. */
export const signInLimits = { minutes: 15, account: 10, address: 50 } as const

/**
 * Checks address and password and answers with the claim for the cookie, in the first organisation by name.
 * An unknown address and a wrong password answer alike and take alike.
 */
export async function signIn(
  { db, now }: Pick<OpenContext, 'db' | 'now'>,
  input: unknown,
  { secret, address }: { secret: string; address: string },
): Promise<Result<SessionClaim & { name: string; email: string }>> {
  const parsed = parseInput(signInSchema, input)
  if (!parsed.ok) return parsed
  const { email, password } = parsed.value
  const account = createHash('sha256').update(email).digest('base64url')
  const since = new Date(now.getTime() - signInLimits.minutes * 60_000)
  const noted = await noteAttempt(db, { account, address, at: now }, since)
  if (noted.account > signInLimits.account || noted.address > signInLimits.address)
    return fail('too-many-attempts')
  const known = await findUserByEmail(db, email)
  if (!(await checkPassword(known?.password_hash ?? null, password)) || !known) return fail('wrong-sign-in')
  await noteSuccess(db, noted.id, account)
  const person = await withUser(db, known.id, (trx) => loadPerson(trx, known.id))
  const membership = person?.memberships[0]
  if (!person || !membership)
    return fail('not-allowed', { message: 'This account belongs to no shop or school any more.' })
  return succeed({
    userId: known.id,
    name: known.name,
    email: known.email,
    organisationId: membership.id,
    stamp: stampOf(secret, person.user, membership),
  })
}
