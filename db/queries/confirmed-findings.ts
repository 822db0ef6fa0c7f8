import { sql } from 'kysely'
import type { Node } from '@/diagrams/document/node-schema'
import type { Mode } from '@/diagrams/document/sites'
import type { Trx } from '../tables/database'

export interface ConfirmedFinding {
  circuit_id: string
  site: string
  mode: Mode
  /** Kind of the part that the site is at, as the circuit has it now; null for a wire or where it is gone. */
  kind: Node['kind'] | null
  count: number
}

/**
 * What the latest finished traces found, repaired and proved, counted by circuit, place and way to fail. `most` bounds
 * the traces looked at; `except` leaves one out, so that a trace is not judged by its own finding.
 */
export function listConfirmedFindings(
  trx: Trx,
  organisationId: string,
  { most, except }: { most: number; except?: string },
): Promise<ConfirmedFinding[]> {
  let latest = trx
    .selectFrom('traces as trace')
    .innerJoin('trace_findings as finding', (join) =>
      join
        .onRef('finding.organisation_id', '=', 'trace.organisation_id')
        .onRef('finding.trace_id', '=', 'trace.id'),
    )
    .select(['trace.circuit_id', 'finding.site', 'finding.mode'])
    .where('trace.organisation_id', '=', organisationId)
    .where('trace.state', '=', 'done')
    .where('finding.repaired', '=', true)
    .where('finding.site', 'is not', null)
    .orderBy('trace.updated_at', 'desc')
    .orderBy('trace.id')
    .limit(most)
  if (except !== undefined) latest = latest.where('trace.id', '<>', except)
  return (
    trx
      .selectFrom(latest.as('found'))
      .select(['found.circuit_id', sql<string>`found.site`.as('site'), sql<Mode>`found.mode`.as('mode')])
      .select(sql<number>`count(*)::int`.as('count'))
      // One look-up by key for each place found: part:k3.coil lies at k3.
      .select(
        sql<Node['kind'] | null>`(select node.kind from circuit_nodes as node
        where node.organisation_id = ${organisationId} and node.circuit_id = found.circuit_id
          and node.id = split_part(split_part(found.site, ':', 2), '.', 1))`.as('kind'),
      )
      .groupBy(['found.circuit_id', 'found.site', 'found.mode'])
      .execute()
  )
}
