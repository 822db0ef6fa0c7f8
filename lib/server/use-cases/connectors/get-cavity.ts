import { connectorOfRow } from '@/db/circuits/circuit-of-rows'
import { cavityContents, findConnector } from '@/db/queries/cavity-contents'
import type { CavityContents } from '@/lib/shared/api/connectors'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { isId } from '../ids'
import { inTransaction } from '../in-transaction'

/** What one cavity of a vehicle's connector carries. */
export async function getCavity(
  context: Context,
  { vehicleId, connectorId, n }: { vehicleId: string; connectorId: string; n: string },
): Promise<Result<CavityContents>> {
  const { actor } = context
  if (!isId(vehicleId) || connectorId.includes('\0') || !can(actor.role, 'connector.read'))
    return fail('not-found')
  if (!/^[1-9][0-9]{0,2}$/.test(n))
    return fail('invalid', { path: 'n', message: `n: cavity "${n}", expected a whole number from 1 to 999` })
  const cavity = Number(n)
  return inTransaction(context, async (trx) => {
    const found = await findConnector(trx, actor.organisationId, vehicleId, connectorId)
    if (!found || (found.cavities !== null && cavity > found.cavities)) return fail('not-found')
    const rows = await cavityContents(trx, actor.organisationId, vehicleId, connectorId, cavity)
    return succeed({
      vehicleId,
      vehicle: found.vehicle,
      connector: connectorOfRow(found),
      cavity,
      carries: rows.map((row) => ({
        circuitId: row.circuitId,
        title: row.title,
        end: `${row.node}.${row.port}`,
        part: row.part,
        wire:
          row.wireId === null
            ? null
            : {
                id: row.wireId,
                colour: row.colour ?? '',
                mm2: row.mm2 ?? 0,
                signal: row.signal ?? '',
                farEnd: `${row.farLabel || row.farNode} ${row.farPort}`,
              },
      })),
    })
  })
}
