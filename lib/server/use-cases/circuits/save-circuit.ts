import { isDeepStrictEqual } from 'node:util'
import { findCircuit, loadDocument, lockCircuit } from '@/db/queries/circuits'
import { lockVehicle } from '@/db/queries/vehicles'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type { StoredCircuit } from '@/lib/shared/api/circuits'
import { saveCircuitSchema } from '@/lib/shared/api/circuits'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { isId } from '../ids'
import { inTransaction } from '../in-transaction'
import { opened, parseInput } from '../parse'
import { describeCircuit } from './describe-circuit'
import { settleConnectors } from './settle-connectors'
import { writeSettled } from './write-settled'

/** Saves the next edition. A base that is not the latest is refused, unless this very save was done already. */
export async function saveCircuit(
  context: Context,
  { id }: { id: string },
  input: unknown,
): Promise<Result<StoredCircuit>> {
  const { actor, newId } = context
  if (!isId(id)) return fail('not-found')
  if (!can(actor.role, 'circuit.edit')) return fail('not-allowed')
  const parsed = parseInput(saveCircuitSchema, input)
  if (!parsed.ok) return parsed
  const document = opened(openCircuit(parsed.value.document), 'document')
  if (!document.ok) return document
  return inTransaction(context, async (trx) => {
    // Before the vehicle is locked or even made: there may be nothing to save to.
    if (!(await findCircuit(trx, actor.organisationId, id))) return fail('not-found')
    const vehicle = await lockVehicle(trx, actor.organisationId, document.value.vehicle, {
      circuitId: id,
      newId: newId(),
    })
    const locked = await lockCircuit(trx, actor.organisationId, id)
    if (!locked) return fail('not-found')
    const again =
      locked.revision === parsed.value.baseRevision + 1 &&
      locked.saved_by === actor.userId &&
      isDeepStrictEqual(await loadDocument(trx, locked), document.value)
    if (again) return succeed(await describeCircuit(trx, actor, { ...locked, saver: actor.name }))
    if (locked.revision !== parsed.value.baseRevision) {
      // Asked again: the lock may have waited for the very save that made this one stale.
      const newer = await findCircuit(trx, actor.organisationId, id)
      return fail('stale-revision', {
        path: 'baseRevision',
        message: `${newer?.saver ?? 'Someone'} saved edition ${locked.revision} of "${locked.title}"; yours builds on edition ${parsed.value.baseRevision} and was not saved.`,
      })
    }
    const settled = await settleConnectors(trx, {
      organisationId: actor.organisationId,
      vehicleId: vehicle.id,
      circuitId: id,
      document: document.value,
      choice: parsed.value.connectors,
    })
    if (!settled.ok) return settled
    const next = { id, vehicleId: vehicle.id, revision: locked.revision + 1 }
    await writeSettled(trx, context, next, settled.value)
    const head = await findCircuit(trx, actor.organisationId, id)
    if (!head) throw new Error(`circuit ${id} is not there right after it was saved`)
    return succeed(await describeCircuit(trx, actor, head))
  })
}
