import { loadDocument, lockCircuit, writeCircuit } from '@/db/queries/circuits'
import type { Trx } from '@/db/tables/database'
import type { Context } from '../../context'
import type { Settled } from './settle-connectors'

/** Writes a document whose connectors are settled, and a new edition of each circuit that they changed. */
export async function writeSettled(
  trx: Trx,
  { actor, now }: Context,
  circuit: { id: string; vehicleId: string; revision: number },
  { document, changed }: Settled,
): Promise<void> {
  const key = (id: string) => ({ organisation_id: actor.organisationId, circuit_id: id })
  const stamp = { by: actor.userId, at: now }
  await writeCircuit(trx, key(circuit.id), circuit.vehicleId, document, {
    ...stamp,
    revision: circuit.revision,
  })
  for (const id of changed) {
    const head = await lockCircuit(trx, actor.organisationId, id)
    // Deleted or moved to another vehicle while this waited: the connector is no longer its own.
    if (head?.vehicle_id !== circuit.vehicleId) continue
    await writeCircuit(trx, key(id), head.vehicle_id, await loadDocument(trx, head), {
      ...stamp,
      revision: head.revision + 1,
    })
  }
}
