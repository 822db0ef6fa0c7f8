import { findTrace } from '@/db/queries/traces'
import type { Trace } from '@/lib/shared/api/traces'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { isId } from '../ids'
import { inTransaction } from '../in-transaction'
import { describeTrace } from './describe-trace'

/** One trace. Somebody else's answers a student like one that is not there. */
export async function getTrace(context: Context, { id }: { id: string }): Promise<Result<Trace>> {
  const { actor } = context
  if (!isId(id)) return fail('not-found')
  return inTransaction(context, async (trx) => {
    const head = await findTrace(trx, actor.organisationId, id)
    return head && can(actor.role, 'trace.read', { own: head.started_by === actor.userId })
      ? succeed(await describeTrace(trx, actor, id))
      : fail('not-found')
  })
}
