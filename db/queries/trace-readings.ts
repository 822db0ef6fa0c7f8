import type { Insertable } from 'kysely'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Trx } from '../tables/database'
import type { TraceReadingsTable } from '../tables/traces'

/** The readings of a trace in the order they were first taken. */
export async function listReadings(trx: Trx, organisationId: string, traceId: string): Promise<Reading[]> {
  const rows = await trx
    .selectFrom('trace_readings')
    .select('reading')
    .where('organisation_id', '=', organisationId)
    .where('trace_id', '=', traceId)
    .orderBy('position')
    .execute()
  return rows.map((row) => row.reading)
}

/** Taken again under the same id, a reading keeps its place in the order. */
export async function putReading(trx: Trx, row: Insertable<TraceReadingsTable>): Promise<void> {
  const { kind, reading, taken_by, taken_at } = row
  await trx
    .insertInto('trace_readings')
    .values(row)
    .onConflict((conflict) =>
      conflict
        .columns(['organisation_id', 'trace_id', 'id'])
        .doUpdateSet({ kind, reading, taken_by, taken_at }),
    )
    .execute()
}

/** False when there was none. */
export async function removeReading(
  trx: Trx,
  organisationId: string,
  traceId: string,
  id: string,
): Promise<boolean> {
  const gone = await trx
    .deleteFrom('trace_readings')
    .where('organisation_id', '=', organisationId)
    .where('trace_id', '=', traceId)
    .where('id', '=', id)
    .returning('id')
    .executeTakeFirst()
  return gone !== undefined
}
