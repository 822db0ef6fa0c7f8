import { loadRevision } from '@/db/queries/circuit-revisions'
import { lockTrace, updateTrace } from '@/db/queries/traces'
import type { Trx } from '@/db/tables/database'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Trace } from '@/lib/shared/api/traces'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { isId } from '../ids'
import { inTransaction } from '../in-transaction'
import { describeTrace } from './describe-trace'

export interface OpenedTrace {
  trx: Trx
  trace: NonNullable<Awaited<ReturnType<typeof lockTrace>>>
  /** The edition the trace was started on. */
  document: Circuit
}

/** What a change of a trace sets on its own row; null when everything was so already. */
export type TraceChange = { state?: 'open' | 'done'; cautions_answered_at?: Date } | null

/** The frame of every write of a trace: found, allowed, locked, changed, and answered whole. */
export function writeTrace(
  context: Context,
  id: string,
  change: (opened: OpenedTrace) => Promise<Result<TraceChange>>,
): Promise<Result<Trace>> {
  const { actor, now } = context
  if (!isId(id)) return Promise.resolve(fail('not-found'))
  return inTransaction(context, async (trx) => {
    const trace = await lockTrace(trx, actor.organisationId, id)
    if (!trace || !can(actor.role, 'trace.write', { own: trace.started_by === actor.userId }))
      return fail('not-found')
    const document = await loadRevision(trx, actor.organisationId, trace.circuit_id, trace.revision)
    const changed = await change({ trx, trace, document })
    if (!changed.ok) return changed
    if (changed.value) await updateTrace(trx, actor.organisationId, id, { ...changed.value, updated_at: now })
    return succeed(await describeTrace(trx, actor, id))
  })
}
