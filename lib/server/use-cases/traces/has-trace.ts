import { findTrace } from '@/db/queries/traces'
import { withOrganisation } from '@/db/with-organisation'
import { can } from '@/lib/shared/permissions'
import type { Context } from '../../context'
import { isId } from '../ids'

/** Whether `getTrace` would find this trace, on this circuit, without reading its readings and document. */
export async function hasTrace(
  { db, actor }: Context,
  { id, circuitId }: { id: string; circuitId: string },
): Promise<boolean> {
  if (!isId(id)) return false
  const { organisationId } = actor
  const head = await withOrganisation(db, organisationId, (trx) => findTrace(trx, organisationId, id))
  return (
    head?.circuit_id === circuitId && can(actor.role, 'trace.read', { own: head.started_by === actor.userId })
  )
}
