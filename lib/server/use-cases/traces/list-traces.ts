import { loadRevision } from '@/db/queries/circuit-revisions'
import { listReadings } from '@/db/queries/trace-readings'
import { listTraces as findTraces } from '@/db/queries/traces'
import type { EvaluationRequest } from '@/diagrams/faults/request'
import type { TraceList, TraceRow } from '@/lib/shared/api/traces'
import { traceListQuerySchema } from '@/lib/shared/api/traces'
import { can } from '@/lib/shared/permissions'
import { type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { inTransaction } from '../in-transaction'
import { parseInput } from '../parse'
import { organisationFindings, organisationOdds } from './organisation-odds'
import { traceProgress } from './trace-progress'

const most = { rows: 100, evaluated: 12 } as const

/** The latest traces first; those of everybody where the role may read them, else one's own. */
export async function listTraces(context: Context, input: unknown): Promise<Result<TraceList>> {
  const { actor } = context
  const parsed = parseInput(traceListQuerySchema, input)
  if (!parsed.ok) return parsed
  const { open, circuitId } = parsed.value
  const found = await inTransaction(context, async (trx) => {
    const heads = await findTraces(trx, actor.organisationId, {
      most: most.rows,
      ...(open === '1' ? { state: 'open' as const } : {}),
      ...(can(actor.role, 'trace.read') ? {} : { startedBy: actor.userId }),
      ...(circuitId === undefined ? {} : { circuitId }),
    })
    const rows: { head: (typeof heads)[number]; work: Omit<EvaluationRequest, 'codes' | 'priors'> | null }[] =
      []
    const findings = await organisationFindings(trx, actor.organisationId)
    for (const head of heads) {
      const evaluated = head.state === 'open' && rows.length < most.evaluated
      if (!evaluated) {
        rows.push({ head, work: null })
        continue
      }
      const circuit = await loadRevision(trx, actor.organisationId, head.circuit_id, head.revision)
      const odds = organisationOdds(findings, { id: head.circuit_id, document: circuit })
      const readings = await listReadings(trx, actor.organisationId, head.id)
      rows.push({ head, work: { circuit, readings, symptoms: head.symptoms, ...(odds ? { odds } : {}) } })
    }
    return succeed(rows)
  })
  if (!found.ok) return found
  // Evaluated after the transaction: arithmetic is no reason to hold a connection.
  const progress = await traceProgress(
    found.value.map(({ head, work }) =>
      work
        ? {
            key: `${head.organisation_id} ${head.id} ${head.updated_at.toISOString()}`,
            request: { ...work, codes: head.codes, priors: 'trade' },
          }
        : null,
    ),
  )
  const rows: TraceRow[] = found.value.map(({ head }, index) => ({
    id: head.id,
    circuitId: head.circuit_id,
    title: head.title,
    vehicle: head.vehicle,
    complaint: head.complaint,
    codes: head.codes,
    readings: head.readings,
    state: head.state,
    by: head.starter ?? '',
    updatedAt: head.updated_at.toISOString(),
    progress: progress[index] ?? null,
  }))
  return succeed({ rows })
}
