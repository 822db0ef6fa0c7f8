import type { Insertable } from 'kysely'
import type { Database, Trx } from '../tables/database'
import type { MembershipsTable, OrganisationsTable, UsersTable } from '../tables/people'

export function findUserByEmail(db: Database, email: string) {
  return db.selectFrom('users').selectAll().where('email', '=', email).executeTakeFirst()
}

/** A person with all memberships they have; call it within `withUser`. */
export async function loadPerson(trx: Trx, userId: string) {
  const user = await trx
    .selectFrom('users')
    .select(['id', 'name', 'email', 'password_hash'])
    .where('id', '=', userId)
    .executeTakeFirst()
  if (!user) return null
  const memberships = await trx
    .selectFrom('memberships as membership')
    .innerJoin('organisations as organisation', 'organisation.id', 'membership.organisation_id')
    .select(['organisation.id', 'organisation.name', 'organisation.kind', 'membership.role'])
    .select('membership.created_at as since')
    .where('membership.user_id', '=', userId)
    .orderBy('organisation.name')
    .execute()
  return { user, memberships }
}

/** An organisation with its first member, in the scope of that organisation. */
export async function insertOrganisation(
  trx: Trx,
  organisation: Insertable<OrganisationsTable>,
): Promise<void> {
  await trx.insertInto('organisations').values(organisation).execute()
}

/** False when the address is taken. */
export async function insertUser(trx: Trx, user: Insertable<UsersTable>): Promise<boolean> {
  const made = await trx
    .insertInto('users')
    .values(user)
    .onConflict((conflict) => conflict.column('email').doNothing())
    .returning('id')
    .executeTakeFirst()
  return made !== undefined
}

export async function insertMembership(trx: Trx, membership: Insertable<MembershipsTable>): Promise<void> {
  await trx
    .insertInto('memberships')
    .values(membership)
    .onConflict((conflict) => conflict.doNothing())
    .execute()
}

export async function updatePassword(trx: Trx, userId: string, passwordHash: string): Promise<void> {
  await trx.updateTable('users').set({ password_hash: passwordHash }).where('id', '=', userId).execute()
}
