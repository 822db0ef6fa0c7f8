import { findCircuit } from '@/db/queries/circuits'
import { withOrganisation } from '@/db/with-organisation'
import { can } from '@/lib/shared/permissions'
import type { Context } from '../../context'
import { isId } from '../ids'

/** Whether `getCircuit` would find one, without reading its document. */
export async function hasCircuit({ db, actor }: Context, { id }: { id: string }): Promise<boolean> {
  if (!isId(id) || !can(actor.role, 'circuit.read')) return false
  const { organisationId } = actor
  return withOrganisation(
    db,
    organisationId,
    async (trx) => (await findCircuit(trx, organisationId, id)) !== undefined,
  )
}
