import { insertMembership, insertOrganisation, insertUser } from '@/db/queries/users'
import { withOrganisation } from '@/db/with-organisation'
import { signUpSchema } from '@/lib/shared/api/account'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { OpenContext } from '../../context'
import { parseInput } from '../parse'
import { hashPassword } from './password'

/** An organisation with its first owner, in one transaction. */
export async function signUp(
  { db, newId }: OpenContext,
  input: unknown,
): Promise<Result<{ userId: string; organisationId: string }>> {
  const parsed = parseInput(signUpSchema, input)
  if (!parsed.ok) return parsed
  const { organisation, kind, name, email, password } = parsed.value
  const password_hash = await hashPassword(password)
  const [userId, organisationId] = [newId(), newId()]
  return withOrganisation(db, organisationId, async (trx) => {
    // First of all, since nothing else is written when the address is taken.
    if (!(await insertUser(trx, { id: userId, email, name, password_hash })))
      return fail('address-taken', { path: 'email' })
    await insertOrganisation(trx, { id: organisationId, name: organisation, kind })
    await insertMembership(trx, { organisation_id: organisationId, user_id: userId, role: 'owner' })
    return succeed({ userId, organisationId })
  })
}
