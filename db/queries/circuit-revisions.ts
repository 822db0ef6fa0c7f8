import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type { Trx } from '../tables/database'

/** One edition of a circuit as it was saved, deleted circuits included. */
export async function loadRevision(
  trx: Trx,
  organisationId: string,
  circuitId: string,
  revision: number,
): Promise<Circuit> {
  const row = await trx
    .selectFrom('circuit_revisions')
    .select('document')
    .where('organisation_id', '=', organisationId)
    .where('circuit_id', '=', circuitId)
    .where('revision', '=', revision)
    .executeTakeFirstOrThrow()
  const opened = openCircuit(row.document)
  if (!opened.ok)
    throw new Error(
      `edition ${revision} of circuit ${circuitId} does not open: ${opened.problems[0]?.message}`,
    )
  return opened.value
}
