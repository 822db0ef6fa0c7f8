import { isDatabaseAway } from '@/db/is-database-away'
import { fail, type Result } from '@/lib/shared/result'
import { log } from '../log'

/** Runs work of a page, action or route: a database that went away is an expected failure, all else a bug. */
export async function attempt<T>(work: () => Promise<Result<T>>): Promise<Result<T>> {
  try {
    return await work()
  } catch (error) {
    // Next's own ways out, such as a redirect, are thrown and must pass.
    if (typeof error === 'object' && error !== null && 'digest' in error) throw error
    if (isDatabaseAway(error)) {
      log.error({ reason: error instanceof Error ? error.message : '' }, 'the database cannot be reached')
      return fail('database-away')
    }
    log.error(error, 'unexpected failure')
    return fail('unexpected')
  }
}
