import { type CircuitHead, loadDocument } from '@/db/queries/circuits'
import type { Trx } from '@/db/tables/database'
import type { StoredCircuit } from '@/lib/shared/api/circuits'
import { can } from '@/lib/shared/permissions'
import type { Actor } from '../../context'

/** A stored circuit as the actor sees it. */
export async function describeCircuit(trx: Trx, actor: Actor, head: CircuitHead): Promise<StoredCircuit> {
  const mine = head.created_by === actor.userId
  return {
    id: head.id,
    revision: head.revision,
    document: await loadDocument(trx, head),
    vehicleId: head.vehicle_id,
    mine,
    may: {
      edit: can(actor.role, 'circuit.edit', { own: mine }),
      delete: can(actor.role, 'circuit.delete', { own: mine }),
    },
    savedBy: head.saver ?? '',
    createdAt: head.created_at.toISOString(),
    updatedAt: head.updated_at.toISOString(),
  }
}
