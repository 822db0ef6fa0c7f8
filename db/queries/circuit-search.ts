import { type RawBuilder, type SqlBool, sql } from 'kysely'
import { colourKey, endOfBeginning, textKey, wordsOf } from '../circuits/search-keys'
import type { Trx } from '../tables/database'

export interface Finders {
  name?: string | undefined
  code?: string | undefined
  connector?: string | undefined
  cavity?: number | undefined
  colour?: string | undefined
  system?: string | undefined
}

/** True when the finders ask for a place in a harness, so that the lines are cavities and not circuits. */
export function asksForPlace(finders: Finders): boolean {
  return Boolean(finders.connector || finders.cavity || finders.colour)
}

/** The living circuits that fit name, code and system. Every word is a range over an index of its own. */
function fittingCircuits(trx: Trx, organisationId: string, finders: Finders) {
  let query = trx
    .selectFrom('circuits as circuit')
    .where('circuit.organisation_id', '=', organisationId)
    .where('circuit.deleted_at', 'is', null)
  if (finders.system !== undefined && finders.system !== '')
    query = query.where('circuit.system', '=', finders.system)
  for (const word of wordsOf(finders.name ?? ''))
    query = query.where('circuit.id', 'in', (sub) =>
      sub
        .selectFrom('circuit_words')
        .select('circuit_id')
        .where('organisation_id', '=', organisationId)
        .where('word', '>=', word)
        .where('word', '<', endOfBeginning(word)),
    )
  const code = codeBeginning(finders)
  if (code !== '')
    query = query.where('circuit.id', 'in', (sub) =>
      sub
        .selectFrom('circuit_codes')
        .select('circuit_id')
        .where('organisation_id', '=', organisationId)
        .where('code_key', '>=', code)
        .where('code_key', '<', endOfBeginning(code)),
    )
  return query
}

function fittingPlaces(trx: Trx, organisationId: string, finders: Finders) {
  let query = fittingCircuits(trx, organisationId, finders)
    .innerJoin('circuit_places as place', (join) =>
      join
        .onRef('place.organisation_id', '=', 'circuit.organisation_id')
        .onRef('place.circuit_id', '=', 'circuit.id'),
    )
    .where('place.organisation_id', '=', organisationId)
  if (finders.connector) {
    const start = textKey(finders.connector)
    query = query
      .where('place.connector', 'is not', null)
      .where('place.connector_key', '>=', start)
      .where('place.connector_key', '<', endOfBeginning(start))
  }
  if (finders.cavity !== undefined) query = query.where('place.number', '=', finders.cavity)
  if (finders.colour) {
    const { base, stripe } = colourKey(finders.colour)
    query = query.where('place.colour_base', '=', base)
    if (stripe !== '' || finders.colour.includes('/')) query = query.where('place.colour_stripe', '=', stripe)
  }
  return query
}

function codeBeginning(finders: Finders): string {
  return (finders.code ?? '').toUpperCase().replace(/\s+/g, '')
}

/** The code asked for, else the circuit's first, with its text. */
function codeOf(finders: Finders, part: 'code_key' | 'text'): RawBuilder<string | null> {
  const start = codeBeginning(finders)
  return sql<string | null>`(
    select ${part === 'text' ? sql`code.rest ->> 'text'` : sql`code.code_key`} from circuit_codes as code
    where code.organisation_id = circuit.organisation_id and code.circuit_id = circuit.id
      and ${start === '' ? sql`true` : sql`code.code_key >= ${start} and code.code_key < ${endOfBeginning(start)}`}
    order by code.position limit 1)`
}

const heads = [
  'circuit.id as circuitId',
  'circuit.title',
  'circuit.title_key as titleKey',
  'circuit.vehicle',
  'circuit.vehicle_id as vehicleId',
  'circuit.system',
  'circuit.updated_at as updatedAt',
] as const

export interface CircuitAfter {
  titleKey: string
  circuitId: string
}

export function searchCircuits(
  trx: Trx,
  organisationId: string,
  finders: Finders,
  { after, most }: { after: CircuitAfter | null; most: number },
) {
  let query = fittingCircuits(trx, organisationId, finders)
    .select(heads)
    .select(codeOf(finders, 'code_key').as('code'))
    .select(codeOf(finders, 'text').as('codeText'))
  if (after)
    query = query.where(
      sql<SqlBool>`(circuit.title_key, circuit.id) > (${after.titleKey} collate "C", ${after.circuitId}::uuid)`,
    )
  return query.orderBy('circuit.title_key').orderBy('circuit.id').limit(most).execute()
}

export interface PlaceAfter {
  connectorKey: string
  number: number
  circuitId: string
  wire: string
  side: 'from' | 'to'
}

export function searchPlaces(
  trx: Trx,
  organisationId: string,
  finders: Finders,
  { after, most }: { after: PlaceAfter | null; most: number },
) {
  let query = fittingPlaces(trx, organisationId, finders)
    .innerJoin('circuit_wires as wire', (join) =>
      join
        .onRef('wire.organisation_id', '=', 'place.organisation_id')
        .onRef('wire.circuit_id', '=', 'place.circuit_id')
        .onRef('wire.id', '=', 'place.wire'),
    )
    .leftJoin('connectors as connector', (join) =>
      join
        .onRef('connector.organisation_id', '=', 'circuit.organisation_id')
        .onRef('connector.vehicle_id', '=', 'circuit.vehicle_id')
        .onRef('connector.id', '=', 'place.connector'),
    )
    .select(heads)
    .select(codeOf(finders, 'code_key').as('code'))
    .select([
      'place.wire',
      'place.side',
      'place.connector',
      'place.connector_key as connectorKey',
      'place.number',
      'place.carries',
      'connector.label as connectorLabel',
      'wire.colour',
      'wire.mm2',
    ])
  if (after)
    query = query.where(
      sql<SqlBool>`(place.connector_key, place.number, place.circuit_id, place.wire, place.side)
        > (${after.connectorKey} collate "C", ${after.number}::int, ${after.circuitId}::uuid, ${after.wire}, ${after.side})`,
    )
  return query
    .orderBy('place.connector_key')
    .orderBy('place.number')
    .orderBy('place.circuit_id')
    .orderBy('place.wire')
    .orderBy('place.side')
    .limit(most)
    .execute()
}

/** How many lines fit over all pages, and in how many circuits. */
export async function countFound(trx: Trx, organisationId: string, finders: Finders) {
  const counts = asksForPlace(finders)
    ? fittingPlaces(trx, organisationId, finders).select(
        sql<string>`count(*) || ' ' || count(distinct circuit.id)`.as('both'),
      )
    : fittingCircuits(trx, organisationId, finders).select(
        sql<string>`count(*) || ' ' || count(*)`.as('both'),
      )
  const { both } = await counts.executeTakeFirstOrThrow()
  const [rows = 0, circuits = 0] = both.split(' ').map(Number)
  return { rows, circuits }
}

/** Living circuits by system, in the order of their names. */
export async function countSystems(trx: Trx, organisationId: string) {
  const rows = await trx
    .selectFrom('circuits')
    .select(['system', sql<string>`count(*)`.as('circuits')])
    .where('organisation_id', '=', organisationId)
    .where('deleted_at', 'is', null)
    .groupBy('system')
    .orderBy('system')
    .execute()
  return rows.map((row) => ({ system: row.system, circuits: Number(row.circuits) }))
}
