import type { Circuit } from '@/diagrams/document/circuit-schema'
import { circuitOfRows } from '../circuits/circuit-of-rows'
import { type CircuitKey, restOf, rowsOfCircuit } from '../circuits/rows-of-circuit'
import { textKey } from '../circuits/search-keys'
import type { Trx } from '../tables/database'
import { inPortions } from './in-portions'

/** A circuit's own row, with the name of who saved it last. Deleted ones are not there. */
export function findCircuit(trx: Trx, organisationId: string, id: string) {
  return trx
    .selectFrom('circuits as circuit')
    .leftJoin('users as saver', 'saver.id', 'circuit.saved_by')
    .selectAll('circuit')
    .select('saver.name as saver')
    .where('circuit.organisation_id', '=', organisationId)
    .where('circuit.id', '=', id)
    .where('circuit.deleted_at', 'is', null)
    .executeTakeFirst()
}
export type CircuitHead = NonNullable<Awaited<ReturnType<typeof findCircuit>>>

/** Takes the row for the rest of the transaction. Lock the vehicle first: everybody does, so nobody waits in a ring. */
export function lockCircuit(trx: Trx, organisationId: string, id: string) {
  return trx
    .selectFrom('circuits')
    .selectAll()
    .where('organisation_id', '=', organisationId)
    .where('id', '=', id)
    .where('deleted_at', 'is', null)
    .forUpdate()
    .executeTakeFirst()
}

/** The document of a circuit, put together from its rows. */
export async function loadDocument(trx: Trx, head: Omit<CircuitHead, 'saver'>): Promise<Circuit> {
  const mine = { organisation_id: head.organisation_id, circuit_id: head.id }
  const connectors = await trx
    .selectFrom('circuit_connectors as used')
    .innerJoin('connectors as connector', (join) =>
      join
        .onRef('connector.organisation_id', '=', 'used.organisation_id')
        .onRef('connector.vehicle_id', '=', 'used.vehicle_id')
        .onRef('connector.id', '=', 'used.connector'),
    )
    .select(['connector.id', 'connector.label', 'connector.cavities', 'connector.rest'])
    .where('used.organisation_id', '=', mine.organisation_id)
    .where('used.circuit_id', '=', mine.circuit_id)
    .orderBy('used.position')
    .execute()
  const nodes = await trx
    .selectFrom('circuit_nodes')
    .selectAll()
    .where('organisation_id', '=', mine.organisation_id)
    .where('circuit_id', '=', mine.circuit_id)
    .orderBy('position')
    .execute()
  const wires = await trx
    .selectFrom('circuit_wires')
    .selectAll()
    .where('organisation_id', '=', mine.organisation_id)
    .where('circuit_id', '=', mine.circuit_id)
    .orderBy('position')
    .execute()
  const codes = await trx
    .selectFrom('circuit_codes')
    .selectAll()
    .where('organisation_id', '=', mine.organisation_id)
    .where('circuit_id', '=', mine.circuit_id)
    .orderBy('position')
    .execute()
  return circuitOfRows({ circuit: head, connectors, nodes, wires, codes })
}

export interface CircuitStamp {
  revision: number
  by: string
  at: Date
}

/** Puts a new circuit's row, or the next revision of one that is locked, and all rows below it. */
export async function writeCircuit(
  trx: Trx,
  key: CircuitKey,
  vehicleId: string,
  circuit: Circuit,
  { revision, by, at }: CircuitStamp,
): Promise<void> {
  await clearCircuit(trx, key)
  const fields = {
    vehicle_id: vehicleId,
    title: circuit.title,
    title_key: textKey(circuit.title),
    vehicle: circuit.vehicle,
    system: circuit.system,
    rest: JSON.stringify(restOf(circuit)),
    revision,
    saved_by: by,
    updated_at: at,
  }
  await trx
    .insertInto('circuits')
    .values({
      organisation_id: key.organisation_id,
      id: key.circuit_id,
      created_by: by,
      created_at: at,
      ...fields,
    })
    .onConflict((conflict) => conflict.columns(['organisation_id', 'id']).doUpdateSet(fields))
    .execute()
  const rows = rowsOfCircuit(circuit, key, vehicleId)
  await inPortions(rows.connectors, (some) => trx.insertInto('circuit_connectors').values(some).execute())
  await inPortions(rows.nodes, (some) => trx.insertInto('circuit_nodes').values(some).execute())
  await inPortions(rows.wires, (some) => trx.insertInto('circuit_wires').values(some).execute())
  await inPortions(rows.cavities, (some) => trx.insertInto('circuit_cavities').values(some).execute())
  await inPortions(rows.places, (some) => trx.insertInto('circuit_places').values(some).execute())
  await inPortions(rows.codes, (some) => trx.insertInto('circuit_codes').values(some).execute())
  await inPortions(rows.words, (some) => trx.insertInto('circuit_words').values(some).execute())
  await trx
    .insertInto('circuit_revisions')
    .values({ ...key, revision, document: JSON.stringify(circuit), saved_by: by, saved_at: at })
    .execute()
}

/** Takes a circuit out of use. Its editions stay, since traces were made on them. */
export async function deleteCircuit(trx: Trx, key: CircuitKey, at: Date): Promise<void> {
  await clearCircuit(trx, key)
  await trx
    .updateTable('circuits')
    .set({ deleted_at: at })
    .where('organisation_id', '=', key.organisation_id)
    .where('id', '=', key.circuit_id)
    .execute()
}

async function clearCircuit(trx: Trx, key: CircuitKey): Promise<void> {
  // Wires, cavities and places go with the nodes and wires they hang on.
  for (const table of ['circuit_nodes', 'circuit_connectors', 'circuit_codes', 'circuit_words'] as const)
    await trx
      .deleteFrom(table)
      .where('organisation_id', '=', key.organisation_id)
      .where('circuit_id', '=', key.circuit_id)
      .execute()
}

/** True for the id of any circuit, deleted ones included. */
export async function isCircuitIdUsed(trx: Trx, organisationId: string, id: string): Promise<boolean> {
  const row = await trx
    .selectFrom('circuits')
    .select('id')
    .where('organisation_id', '=', organisationId)
    .where('id', '=', id)
    .executeTakeFirst()
  return row !== undefined
}
