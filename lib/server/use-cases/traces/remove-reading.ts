import { removeReading as deleteReading } from '@/db/queries/trace-readings'
import type { Trace } from '@/lib/shared/api/traces'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { writeTrace } from './write-trace'

/** Takes a reading out again. One that is not there is already out. */
export function removeReading(
  context: Context,
  { id, readingId }: { id: string; readingId: string },
): Promise<Result<Trace>> {
  return writeTrace(context, id, async ({ trx, trace }) => {
    if (readingId.includes('\0')) return succeed(null)
    const gone = await deleteReading(trx, trace.organisation_id, id, readingId)
    if (gone && trace.state === 'done') return fail('trace-done')
    return succeed(gone ? {} : null)
  })
}
