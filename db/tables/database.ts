import type { Kysely, Transaction } from 'kysely'
import type * as circuits from './circuits'
import type * as people from './people'
import type * as traces from './traces'

/** Every table the application may touch. */
export interface Tables {
  organisations: people.OrganisationsTable
  users: people.UsersTable
  memberships: people.MembershipsTable
  sign_in_attempts: people.SignInAttemptsTable
  vehicles: circuits.VehiclesTable
  connectors: circuits.ConnectorsTable
  circuits: circuits.CircuitsTable
  circuit_connectors: circuits.CircuitConnectorsTable
  circuit_nodes: circuits.CircuitNodesTable
  circuit_wires: circuits.CircuitWiresTable
  circuit_cavities: circuits.CircuitCavitiesTable
  circuit_places: circuits.CircuitPlacesTable
  circuit_codes: circuits.CircuitCodesTable
  circuit_words: circuits.CircuitWordsTable
  circuit_revisions: circuits.CircuitRevisionsTable
  traces: traces.TracesTable
  trace_readings: traces.TraceReadingsTable
  trace_findings: traces.TraceFindingsTable
  trace_proofs: traces.TraceProofsTable
}

export type Database = Kysely<Tables>
/** A query that takes one of these locks, or belongs to a write that must be whole. */
export type Trx = Transaction<Tables>
