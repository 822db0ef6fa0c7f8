import { sql } from 'kysely'
import type { Trx } from '../tables/database'

/** What a cavity carries, over all circuits of its vehicle: one row for each wire that lands there, or for a bare place. */
export function cavityContents(
  trx: Trx,
  organisationId: string,
  vehicleId: string,
  connector: string,
  number: number,
) {
  return trx
    .selectFrom('circuit_cavities as cavity')
    .innerJoin('circuits as circuit', (join) =>
      join
        .onRef('circuit.organisation_id', '=', 'cavity.organisation_id')
        .onRef('circuit.id', '=', 'cavity.circuit_id'),
    )
    .leftJoin('circuit_wires as wire', (join) =>
      join
        .onRef('wire.organisation_id', '=', 'cavity.organisation_id')
        .onRef('wire.circuit_id', '=', 'cavity.circuit_id')
        .on((on) =>
          on.or([
            on.and([
              on('wire.from_node', '=', on.ref('cavity.node')),
              on('wire.from_port', '=', on.ref('cavity.port')),
            ]),
            on.and([
              on('wire.to_node', '=', on.ref('cavity.node')),
              on('wire.to_port', '=', on.ref('cavity.port')),
            ]),
          ]),
        ),
    )
    .leftJoin('circuit_nodes as far', (join) =>
      join
        .onRef('far.organisation_id', '=', 'cavity.organisation_id')
        .onRef('far.circuit_id', '=', 'cavity.circuit_id')
        .on(
          'far.id',
          '=',
          sql<string>`case when wire.from_node = cavity.node and wire.from_port = cavity.port
            then wire.to_node else wire.from_node end`,
        ),
    )
    .select([
      'circuit.id as circuitId',
      'circuit.title',
      'cavity.node',
      'cavity.port',
      'cavity.name as part',
      'wire.id as wireId',
      'wire.colour',
      'wire.mm2',
      'wire.signal',
      'far.id as farNode',
      'far.label as farLabel',
    ])
    .select(
      sql<string | null>`case when wire.from_node = cavity.node and wire.from_port = cavity.port
        then wire.to_port else wire.from_port end`.as('farPort'),
    )
    .where('cavity.organisation_id', '=', organisationId)
    .where('cavity.vehicle_id', '=', vehicleId)
    .where('cavity.connector', '=', connector)
    .where('cavity.number', '=', number)
    .where('circuit.deleted_at', 'is', null)
    .orderBy('circuit.title_key')
    .orderBy('circuit.id')
    .orderBy('cavity.port')
    .orderBy('wire.position')
    .execute()
}

/** A connector with the title of its vehicle. */
export function findConnector(trx: Trx, organisationId: string, vehicleId: string, id: string) {
  return trx
    .selectFrom('connectors as connector')
    .innerJoin('vehicles as vehicle', (join) =>
      join
        .onRef('vehicle.organisation_id', '=', 'connector.organisation_id')
        .onRef('vehicle.id', '=', 'connector.vehicle_id'),
    )
    .select(['connector.id', 'connector.label', 'connector.cavities', 'connector.rest'])
    .select('vehicle.title as vehicle')
    .where('connector.organisation_id', '=', organisationId)
    .where('connector.vehicle_id', '=', vehicleId)
    .where('connector.id', '=', id)
    .executeTakeFirst()
}
