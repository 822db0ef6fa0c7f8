import {
  asksForPlace,
  countFound,
  countSystems,
  searchCircuits as findCircuits,
  searchPlaces,
} from '@/db/queries/circuit-search'
import type { CircuitPage, CircuitRow } from '@/lib/shared/api/circuits'
import { circuitSearchSchema } from '@/lib/shared/api/circuits'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { inTransaction } from '../in-transaction'
import { parseInput } from '../parse'
import { circuitCursorSchema, openCursor, placeCursorSchema, sealCursor } from './cursor'

const pageRows = 50

/** The lines of the Circuits page: cavities when a place in a harness is asked for, else circuits. */
export async function searchCircuits(context: Context, input: unknown): Promise<Result<CircuitPage>> {
  const { actor } = context
  if (!can(actor.role, 'circuit.read')) return fail('not-allowed')
  const parsed = parseInput(circuitSearchSchema, input)
  if (!parsed.ok) return parsed
  const { cursor, ...finders } = parsed.value
  const byPlace = asksForPlace(finders)
  const placeAfter = byPlace ? openCursor(placeCursorSchema, cursor) : succeed(null)
  const circuitAfter = byPlace ? succeed(null) : openCursor(circuitCursorSchema, cursor)
  if (!placeAfter.ok) return placeAfter
  if (!circuitAfter.ok) return circuitAfter
  return inTransaction(context, async (trx) => {
    const of = actor.organisationId
    const lines: { row: CircuitRow; after: unknown }[] = byPlace
      ? (await searchPlaces(trx, of, finders, { after: placeAfter.value, most: pageRows + 1 })).map(
          (found) => ({
            row: placeRow(found),
            after: {
              connectorKey: found.connectorKey,
              number: found.number,
              circuitId: found.circuitId,
              wire: found.wire,
              side: found.side,
            },
          }),
        )
      : (await findCircuits(trx, of, finders, { after: circuitAfter.value, most: pageRows + 1 })).map(
          (found) => ({
            row: {
              ...headOf(found),
              key: found.circuitId,
              kind: 'circuit' as const,
              cavity: null,
              wire: null,
              carries: found.codeText ?? '',
            },
            after: { titleKey: found.titleKey, circuitId: found.circuitId },
          }),
        )
    const page = lines.slice(0, pageRows)
    const systems = await countSystems(trx, of)
    return succeed({
      rows: page.map((line) => line.row),
      nextCursor: lines.length > pageRows ? sealCursor(page.at(-1)?.after) : null,
      found: await countFound(trx, of, finders),
      systems,
      circuits: systems.reduce((sum, { circuits }) => sum + circuits, 0),
    })
  })
}

type FoundPlace = Awaited<ReturnType<typeof searchPlaces>>[number]

function placeRow(found: FoundPlace): CircuitRow {
  return {
    ...headOf(found),
    key: `${found.circuitId}/${found.wire}/${found.side}`,
    kind: found.connector === null ? 'wire' : 'cavity',
    cavity:
      found.connector === null
        ? null
        : {
            vehicleId: found.vehicleId,
            connectorId: found.connector,
            connector: found.connectorLabel || found.connector,
            number: found.number,
          },
    wire: { id: found.wire, colour: found.colour, mm2: found.mm2 },
    carries: found.carries,
  }
}

function headOf(
  found: Pick<FoundPlace, 'circuitId' | 'title' | 'vehicle' | 'system' | 'code' | 'updatedAt'>,
) {
  return {
    circuitId: found.circuitId,
    title: found.title,
    vehicle: found.vehicle,
    system: found.system,
    code: found.code,
    updatedAt: found.updatedAt.toISOString(),
  }
}
