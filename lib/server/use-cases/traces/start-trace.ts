import { isDeepStrictEqual } from 'node:util'
import { loadRevision } from '@/db/queries/circuit-revisions'
import { findCircuit } from '@/db/queries/circuits'
import { findTrace, insertTrace } from '@/db/queries/traces'
import { checkSymptoms } from '@/diagrams/faults/symptom-schema'
import type { Trace } from '@/lib/shared/api/traces'
import { startTraceSchema } from '@/lib/shared/api/traces'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { inTransaction } from '../in-transaction'
import { invalid, parseInput } from '../parse'
import { describeTrace } from './describe-trace'

/** Starts a trace on the circuit's latest edition. The same request again answers with the trace already there. */
export async function startTrace(context: Context, input: unknown): Promise<Result<Trace>> {
  const { actor, now } = context
  if (!can(actor.role, 'trace.create')) return fail('not-allowed')
  const parsed = parseInput(startTraceSchema, input)
  if (!parsed.ok) return parsed
  const { id, circuitId, vehicle, complaint, codes, symptoms } = parsed.value
  return inTransaction(context, async (trx) => {
    const circuit = await findCircuit(trx, actor.organisationId, circuitId)
    const before = await findTrace(trx, actor.organisationId, id)
    if (!before && !circuit) return fail('not-found', { path: 'circuitId' })
    if (!before && circuit && symptoms.length > 0) {
      const document = await loadRevision(trx, actor.organisationId, circuitId, circuit.revision)
      const problems = checkSymptoms(document, symptoms)
      if (problems.length > 0) return invalid(problems)
    }
    const made =
      circuit !== undefined &&
      (await insertTrace(trx, {
        organisation_id: actor.organisationId,
        id,
        circuit_id: circuitId,
        revision: circuit.revision,
        started_by: actor.userId,
        vehicle: vehicle || circuit.vehicle,
        complaint,
        codes: JSON.stringify(codes),
        symptoms: JSON.stringify(symptoms),
        state: 'open',
        started_at: now,
        updated_at: now,
      }))
    if (!made) {
      // Read again: the insert may have waited for a request of the same id to finish.
      const there = await findTrace(trx, actor.organisationId, id)
      const same =
        there?.started_by === actor.userId &&
        there.circuit_id === circuitId &&
        there.complaint === complaint &&
        isDeepStrictEqual(there.codes, codes) &&
        isDeepStrictEqual(there.symptoms, symptoms)
      if (!same) return fail('id-taken', { path: 'id' })
    }
    return succeed(await describeTrace(trx, actor, id))
  })
}
