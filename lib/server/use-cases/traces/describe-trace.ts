import { loadRevision } from '@/db/queries/circuit-revisions'
import { listReadings } from '@/db/queries/trace-readings'
import { findFinding, findProof, findTrace } from '@/db/queries/traces'
import type { Trx } from '@/db/tables/database'
import type { Trace } from '@/lib/shared/api/traces'
import type { Actor } from '../../context'
import { organisationFindings, organisationOdds } from './organisation-odds'

/** A whole trace as the actor sees it. */
export async function describeTrace(trx: Trx, actor: Actor, id: string): Promise<Trace> {
  const of = actor.organisationId
  const head = await findTrace(trx, of, id)
  if (!head) throw new Error(`trace ${id} is not there although it was just found`)
  const finding = await findFinding(trx, of, id)
  const proof = await findProof(trx, of, id)
  const document = await loadRevision(trx, of, head.circuit_id, head.revision)
  return {
    id,
    circuit: { id: head.circuit_id, revision: head.revision, document },
    vehicle: head.vehicle,
    complaint: head.complaint,
    codes: head.codes,
    symptoms: head.symptoms,
    readings: await listReadings(trx, of, id),
    cautionsAnsweredAt: head.cautions_answered_at?.toISOString() ?? null,
    finding: finding
      ? {
          site: finding.site,
          mode: finding.mode,
          note: finding.note,
          repaired: finding.repaired,
          at: finding.found_at.toISOString(),
        }
      : null,
    proof: proof ? { reading: proof.reading, works: proof.works, at: proof.proved_at.toISOString() } : null,
    odds: organisationOdds(await organisationFindings(trx, of, id), { id: head.circuit_id, document }),
    state: head.state,
    by: head.starter ?? '',
    mine: head.started_by === actor.userId,
    startedAt: head.started_at.toISOString(),
    updatedAt: head.updated_at.toISOString(),
  }
}
