import type { Trx } from '@/db/tables/database'
import { withOrganisation } from '@/db/with-organisation'
import type { Failure, Result } from '@/lib/shared/result'
import type { Context } from '../context'

/** One transaction in the actor's organisation. A failure undoes what was written before it was found. */
export async function inTransaction<T>(
  { db, actor }: Context,
  work: (trx: Trx) => Promise<Result<T>>,
): Promise<Result<T>> {
  try {
    return await withOrganisation(db, actor.organisationId, async (trx) => {
      const result = await work(trx)
      if (!result.ok) throw new Refused(result.failure)
      return result
    })
  } catch (error) {
    if (error instanceof Refused) return { ok: false, failure: error.failure }
    throw error
  }
}

class Refused extends Error {
  constructor(readonly failure: Failure) {
    super(failure.message)
  }
}
