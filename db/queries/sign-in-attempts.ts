import { sql } from 'kysely'
import type { Database } from '../tables/database'

export interface Attempt {
  /** A digest of the address signed in with: what was typed is not kept. */
  account: string
  /** Network address of the client. */
  address: string
  at: Date
}

/**
 * Notes an attempt as failed before it is tried, and says how many failed since a moment, this one included.
 * Noting first, each on its own, means that any number of processes trying at once count each other.
 */
export async function noteAttempt(db: Database, attempt: Attempt, since: Date) {
  await db
    .deleteFrom('sign_in_attempts')
    .where('at', '<', new Date(since.getTime() - 86_400_000))
    .execute()
  const { id } = await db
    .insertInto('sign_in_attempts')
    .values(attempt)
    .returning('id')
    .executeTakeFirstOrThrow()
  const count = (column: 'account' | 'address') =>
    db
      .selectFrom('sign_in_attempts')
      .select(sql<number>`count(*)::int`.as('failed'))
      .where(column, '=', attempt[column])
      .where('at', '>', since)
      .where('succeeded', '=', false)
      .executeTakeFirstOrThrow()
  return { id, account: (await count('account')).failed, address: (await count('address')).failed }
}

/** Takes back the failure noted, and what the account had failed before: the right password was known. */
export async function noteSuccess(db: Database, id: string, account: string): Promise<void> {
  await db
    .updateTable('sign_in_attempts')
    .set({ succeeded: true })
    .where((is) => is.or([is('id', '=', id), is('account', '=', account)]))
    .execute()
}
