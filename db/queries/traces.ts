import type { Insertable } from 'kysely'
import { sql } from 'kysely'
import type { Trx } from '../tables/database'
import type { TraceFindingsTable, TraceProofsTable, TracesTable } from '../tables/traces'

/** A trace with the name of who started it. */
export function findTrace(trx: Trx, organisationId: string, id: string) {
  return trx
    .selectFrom('traces as trace')
    .leftJoin('users as starter', 'starter.id', 'trace.started_by')
    .selectAll('trace')
    .select('starter.name as starter')
    .where('trace.organisation_id', '=', organisationId)
    .where('trace.id', '=', id)
    .executeTakeFirst()
}
export type TraceHead = NonNullable<Awaited<ReturnType<typeof findTrace>>>

/** Takes the trace for the rest of the transaction: its state and its readings change together. */
export function lockTrace(trx: Trx, organisationId: string, id: string) {
  return trx
    .selectFrom('traces')
    .selectAll()
    .where('organisation_id', '=', organisationId)
    .where('id', '=', id)
    .forUpdate()
    .executeTakeFirst()
}

/** False when the id is already there. */
export async function insertTrace(trx: Trx, trace: Insertable<TracesTable>): Promise<boolean> {
  const made = await trx
    .insertInto('traces')
    .values(trace)
    .onConflict((conflict) => conflict.columns(['organisation_id', 'id']).doNothing())
    .returning('id')
    .executeTakeFirst()
  return made !== undefined
}

export async function updateTrace(
  trx: Trx,
  organisationId: string,
  id: string,
  change: { updated_at: Date; state?: 'open' | 'done'; cautions_answered_at?: Date },
): Promise<void> {
  await trx
    .updateTable('traces')
    .set(change)
    .where('organisation_id', '=', organisationId)
    .where('id', '=', id)
    .execute()
}

export interface TraceFilter {
  state?: 'open' | 'done'
  startedBy?: string
  circuitId?: string
  most: number
}

/** The latest traces first, with the circuit's title and the number of readings. */
export function listTraces(trx: Trx, organisationId: string, filter: TraceFilter) {
  let query = trx
    .selectFrom('traces as trace')
    .innerJoin('circuits as circuit', (join) =>
      join
        .onRef('circuit.organisation_id', '=', 'trace.organisation_id')
        .onRef('circuit.id', '=', 'trace.circuit_id'),
    )
    .leftJoin('users as starter', 'starter.id', 'trace.started_by')
    .selectAll('trace')
    .select(['circuit.title', 'starter.name as starter'])
    .select(
      sql<number>`(select count(*)::int from trace_readings as reading
        where reading.organisation_id = trace.organisation_id and reading.trace_id = trace.id)`.as(
        'readings',
      ),
    )
    .where('trace.organisation_id', '=', organisationId)
  if (filter.state) query = query.where('trace.state', '=', filter.state)
  if (filter.startedBy) query = query.where('trace.started_by', '=', filter.startedBy)
  if (filter.circuitId) query = query.where('trace.circuit_id', '=', filter.circuitId)
  return query.orderBy('trace.updated_at', 'desc').orderBy('trace.id').limit(filter.most).execute()
}

export function findFinding(trx: Trx, organisationId: string, traceId: string) {
  return trx
    .selectFrom('trace_findings')
    .selectAll()
    .where('organisation_id', '=', organisationId)
    .where('trace_id', '=', traceId)
    .executeTakeFirst()
}

export async function putFinding(trx: Trx, finding: Insertable<TraceFindingsTable>): Promise<void> {
  await trx
    .insertInto('trace_findings')
    .values(finding)
    .onConflict((conflict) => conflict.columns(['organisation_id', 'trace_id']).doUpdateSet(finding))
    .execute()
}

export function findProof(trx: Trx, organisationId: string, traceId: string) {
  return trx
    .selectFrom('trace_proofs')
    .selectAll()
    .where('organisation_id', '=', organisationId)
    .where('trace_id', '=', traceId)
    .executeTakeFirst()
}

export async function putProof(trx: Trx, proof: Insertable<TraceProofsTable>): Promise<void> {
  await trx
    .insertInto('trace_proofs')
    .values(proof)
    .onConflict((conflict) => conflict.columns(['organisation_id', 'trace_id']).doUpdateSet(proof))
    .execute()
}
