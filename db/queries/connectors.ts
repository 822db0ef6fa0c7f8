import { sql } from 'kysely'
import type { Connector } from '@/diagrams/document/circuit-schema'
import { connectorOfRow } from '../circuits/circuit-of-rows'
import { connectorRow } from '../circuits/rows-of-circuit'
import type { Trx } from '../tables/database'

/** A vehicle's connectors of the given ids; the caller holds the vehicle's lock. */
export async function connectorsOfVehicle(
  trx: Trx,
  organisationId: string,
  vehicleId: string,
  ids: string[],
): Promise<Map<string, Connector>> {
  if (ids.length === 0) return new Map()
  const rows = await trx
    .selectFrom('connectors')
    .select(['id', 'label', 'cavities', 'rest'])
    .where('organisation_id', '=', organisationId)
    .where('vehicle_id', '=', vehicleId)
    .where('id', 'in', ids)
    .execute()
  return new Map(rows.map((row) => [row.id, connectorOfRow(row)]))
}

export async function putConnectors(
  trx: Trx,
  organisationId: string,
  vehicleId: string,
  connectors: Connector[],
): Promise<void> {
  if (connectors.length === 0) return
  await trx
    .insertInto('connectors')
    .values(
      connectors.map((connector) =>
        connectorRow(connector, { organisation_id: organisationId, vehicle_id: vehicleId }),
      ),
    )
    .onConflict((conflict) =>
      conflict.columns(['organisation_id', 'vehicle_id', 'id']).doUpdateSet((of) => ({
        label: of.ref('excluded.label'),
        label_key: of.ref('excluded.label_key'),
        cavities: of.ref('excluded.cavities'),
        rest: of.ref('excluded.rest'),
      })),
    )
    .execute()
}

/** The other living circuits that share any of these connectors, with the highest cavity each uses of it. */
export function otherUsers(
  trx: Trx,
  organisationId: string,
  vehicleId: string,
  connectors: string[],
  circuitId: string,
) {
  if (connectors.length === 0) return Promise.resolve([])
  return trx
    .selectFrom('circuit_connectors as shared')
    .innerJoin('circuits as circuit', (join) =>
      join
        .onRef('circuit.organisation_id', '=', 'shared.organisation_id')
        .onRef('circuit.id', '=', 'shared.circuit_id'),
    )
    .leftJoin('circuit_cavities as cavity', (join) =>
      join
        .onRef('cavity.organisation_id', '=', 'shared.organisation_id')
        .onRef('cavity.circuit_id', '=', 'shared.circuit_id')
        .onRef('cavity.connector', '=', 'shared.connector'),
    )
    .select(['shared.connector', 'circuit.id', 'circuit.title'])
    .select(sql<number>`coalesce(max(cavity.number), 0)`.as('highest'))
    .where('shared.organisation_id', '=', organisationId)
    .where('shared.vehicle_id', '=', vehicleId)
    .where('shared.connector', 'in', connectors)
    .where('shared.circuit_id', '!=', circuitId)
    .where('circuit.deleted_at', 'is', null)
    .groupBy(['shared.connector', 'circuit.id', 'circuit.title'])
    .orderBy('circuit.title')
    .execute()
}

/** Ids of the vehicle's connectors that a circuit uses as it is stored. */
export async function connectorsOfCircuit(
  trx: Trx,
  organisationId: string,
  vehicleId: string,
  circuitId: string,
): Promise<Set<string>> {
  const rows = await trx
    .selectFrom('circuit_connectors')
    .select('connector')
    .where('organisation_id', '=', organisationId)
    .where('circuit_id', '=', circuitId)
    .where('vehicle_id', '=', vehicleId)
    .execute()
  return new Set(rows.map((row) => row.connector))
}
