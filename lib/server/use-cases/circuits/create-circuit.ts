import { findCircuit, isCircuitIdUsed } from '@/db/queries/circuits'
import { lockVehicle } from '@/db/queries/vehicles'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type { StoredCircuit } from '@/lib/shared/api/circuits'
import { createCircuitSchema } from '@/lib/shared/api/circuits'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { inTransaction } from '../in-transaction'
import { opened, parseInput } from '../parse'
import { describeCircuit } from './describe-circuit'
import { settleConnectors } from './settle-connectors'
import { writeSettled } from './write-settled'

/** Takes a document into the library: drawn anew or imported. The same id again answers with what is there. */
export async function createCircuit(context: Context, input: unknown): Promise<Result<StoredCircuit>> {
  const { actor, newId } = context
  if (!can(actor.role, 'circuit.create')) return fail('not-allowed')
  const parsed = parseInput(createCircuitSchema, input)
  if (!parsed.ok) return parsed
  const document = opened(openCircuit(parsed.value.document), 'document')
  if (!document.ok) return document
  const id = parsed.value.id ?? newId()
  return inTransaction(context, async (trx) => {
    const vehicle = await lockVehicle(trx, actor.organisationId, document.value.vehicle, {
      circuitId: id,
      newId: newId(),
    })
    const before = await findCircuit(trx, actor.organisationId, id)
    if (before)
      return before.created_by === actor.userId
        ? succeed(await describeCircuit(trx, actor, before))
        : fail('id-taken')
    if (await isCircuitIdUsed(trx, actor.organisationId, id)) return fail('id-taken')
    const settled = await settleConnectors(trx, {
      organisationId: actor.organisationId,
      vehicleId: vehicle.id,
      circuitId: id,
      document: document.value,
      choice: parsed.value.connectors,
    })
    if (!settled.ok) return settled
    await writeSettled(trx, context, { id, vehicleId: vehicle.id, revision: 1 }, settled.value)
    const head = await findCircuit(trx, actor.organisationId, id)
    if (!head) throw new Error(`circuit ${id} is not there right after it was written`)
    return succeed(await describeCircuit(trx, actor, head))
  })
}
