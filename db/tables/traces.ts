import type { ColumnType, Generated } from 'kysely'
import type { Reading, ReadingKind } from '@/diagrams/document/reading-schema'
import type { Mode } from '@/diagrams/document/sites'
import type { Symptom } from '@/diagrams/faults/symptom-schema'
import type { Json } from './circuits'
import type { Moment } from './people'

export interface TracesTable {
  organisation_id: string
  id: string
  circuit_id: string
  revision: number
  started_by: string | null
  vehicle: string
  complaint: string
  codes: Json<string[]>
  symptoms: Json<Symptom[]>
  cautions_answered_at: ColumnType<Date | null, Date | null | undefined, Date | null>
  state: 'open' | 'done'
  started_at: Moment
  updated_at: Moment
}

interface OfTrace {
  organisation_id: string
  trace_id: string
}

export interface TraceReadingsTable extends OfTrace {
  id: string
  position: Generated<string>
  kind: ReadingKind
  reading: Json<Reading>
  taken_by: string | null
  taken_at: Moment
}

export interface TraceFindingsTable extends OfTrace {
  site: string | null
  mode: Mode | null
  note: string
  repaired: boolean
  found_by: string | null
  found_at: Moment
}

export interface TraceProofsTable extends OfTrace {
  reading: Json<Reading>
  works: boolean
  proved_by: string | null
  proved_at: Moment
}
