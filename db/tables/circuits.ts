import type { ColumnType } from 'kysely'
import type { Circuit, CodeEntry, Connector, Wire } from '@/diagrams/document/circuit-schema'
import type { NodeKind } from '@/diagrams/document/node-schema'
import type { MadeMoment, Moment } from './people'

/** jsonb: read as the value, written as its text (node-postgres would write an array as a PostgreSQL array). */
export type Json<T> = ColumnType<T, string, string>

export interface VehiclesTable {
  organisation_id: string
  id: string
  title: string
  title_key: string
  created_at: MadeMoment
}

export interface ConnectorsTable {
  organisation_id: string
  vehicle_id: string
  id: string
  label: string
  label_key: string
  cavities: number | null
  rest: Json<Omit<Connector, 'id' | 'label' | 'cavities'>>
}

/** The fields of a document that nothing searches. */
export type CircuitRest = Pick<Circuit, 'operation' | 'cautions' | 'controls' | 'sequence' | 'annotations'>

export interface CircuitsTable {
  organisation_id: string
  id: string
  vehicle_id: string
  title: string
  title_key: string
  vehicle: string
  system: string
  revision: number
  rest: Json<CircuitRest>
  created_by: string | null
  saved_by: string | null
  created_at: Moment
  updated_at: Moment
  deleted_at: ColumnType<Date | null, Date | null | undefined, Date | null>
}

interface OfCircuit {
  organisation_id: string
  circuit_id: string
}

export interface CircuitConnectorsTable extends OfCircuit {
  position: number
  vehicle_id: string
  connector: string
}

export interface CircuitNodesTable extends OfCircuit {
  id: string
  position: number
  kind: NodeKind
  label: string
  connector: string | null
  rest: Json<Record<string, unknown>>
}

export interface CircuitWiresTable extends OfCircuit {
  id: string
  position: number
  from_node: string
  from_port: string
  to_node: string
  to_port: string
  colour: string
  signal: string
  mm2: number
  rest: Json<Pick<Wire, 'length' | 'ohms' | 'bends'>>
}

export interface CircuitCavitiesTable extends OfCircuit {
  node: string
  port: string
  vehicle_id: string
  connector: string
  number: number
  name: string
}

export interface CircuitPlacesTable extends OfCircuit {
  wire: string
  side: 'from' | 'to'
  connector: string | null
  connector_key: string
  number: number
  colour_base: string
  colour_stripe: string
  carries: string
}

export interface CircuitCodesTable extends OfCircuit {
  position: number
  code: string
  failure_type: string | null
  code_key: string
  rest: Json<Omit<CodeEntry, 'code' | 'failureType'>>
}

export interface CircuitWordsTable extends OfCircuit {
  word: string
}

export interface CircuitRevisionsTable extends OfCircuit {
  revision: number
  document: Json<unknown>
  saved_by: string | null
  saved_at: Moment
}
