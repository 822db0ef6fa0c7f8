import { sql } from 'kysely'
import type { Database, Trx } from './tables/database'

/**
 * Runs one transaction in the scope of an organisation. Row-level security reads the scope, so a query that
 * forgets its `where` still sees this organisation alone; outside of here nothing is seen at all.
 */
export function withOrganisation<T>(
  db: Database,
  organisationId: string,
  work: (trx: Trx) => Promise<T>,
): Promise<T> {
  return db.transaction().execute(async (trx) => {
    await sql`select set_config('halfsplit.organisation', ${organisationId}, true)`.execute(trx)
    return work(trx)
  })
}

/** Runs one transaction in which a person sees their own memberships, in whichever organisations. */
export function withUser<T>(db: Database, userId: string, work: (trx: Trx) => Promise<T>): Promise<T> {
  return db.transaction().execute(async (trx) => {
    await sql`select set_config('halfsplit.user', ${userId}, true)`.execute(trx)
    return work(trx)
  })
}
