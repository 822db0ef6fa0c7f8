import { deleteCircuit as removeRows, lockCircuit } from '@/db/queries/circuits'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { isId } from '../ids'
import { inTransaction } from '../in-transaction'

/** Takes a circuit out of the library. Traces made on it stay whole. */
export async function deleteCircuit(context: Context, { id }: { id: string }): Promise<Result<null>> {
  const { actor, now } = context
  if (!isId(id)) return fail('not-found')
  return inTransaction(context, async (trx) => {
    const circuit = await lockCircuit(trx, actor.organisationId, id)
    if (!circuit) return fail('not-found')
    if (!can(actor.role, 'circuit.delete', { own: circuit.created_by === actor.userId }))
      return fail('not-allowed')
    await removeRows(trx, { organisation_id: actor.organisationId, circuit_id: id }, now)
    return succeed(null)
  })
}
