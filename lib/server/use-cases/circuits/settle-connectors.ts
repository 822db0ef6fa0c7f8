import { connectorsOfCircuit, connectorsOfVehicle, otherUsers, putConnectors } from '@/db/queries/connectors'
import type { Trx } from '@/db/tables/database'
import type { Circuit, Connector } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { connectorName } from '@/diagrams/document/points'
import type { ConnectorChoice } from '@/lib/shared/api/circuits'
import { fail, type Result, succeed } from '@/lib/shared/result'
import { opened } from '../parse'

export interface Settled {
  /** The document with the connectors as the vehicle now has them. */
  document: Circuit
  /** Other circuits whose document changed, because a connector they share was replaced. */
  changed: string[]
}

export interface SettleInput {
  organisationId: string
  vehicleId: string
  circuitId: string
  document: Circuit
  choice: ConnectorChoice
}

/**
 * Brings a document and its vehicle's connectors together; the vehicle must be locked. A connector that differs
 * is refused, kept or replaced as told; one that no other circuit uses and this one had already is simply saved.
 */
export async function settleConnectors(trx: Trx, input: SettleInput): Promise<Result<Settled>> {
  const { organisationId, vehicleId, circuitId, document, choice } = input
  const ids = document.connectors.map((connector) => connector.id)
  const stored = await connectorsOfVehicle(trx, organisationId, vehicleId, ids)
  const others = await otherUsers(trx, organisationId, vehicleId, ids, circuitId)
  const own = await connectorsOfCircuit(trx, organisationId, vehicleId, circuitId)
  const differing = document.connectors.filter((connector) => {
    const known = stored.get(connector.id)
    return known !== undefined && differences(known, connector).length > 0
  })
  const contested = differing.filter(
    ({ id }) => !own.has(id) || others.some((other) => other.connector === id),
  )
  if (contested.length > 0 && choice === 'refuse') {
    const details = contested.flatMap((connector) =>
      differences(stored.get(connector.id) ?? connector, connector),
    )
    const first = document.connectors.indexOf(contested[0] as Connector)
    return fail('connector-differs', {
      path: `document.connectors.${first}`,
      message: `${details.join('; ')}. Keep the vehicle's connector or replace it.`,
      details,
    })
  }
  if (contested.length > 0 && choice === 'keep') {
    const kept = {
      ...document,
      connectors: document.connectors.map((connector) =>
        contested.includes(connector) ? (stored.get(connector.id) ?? connector) : connector,
      ),
    }
    const checked = opened(openCircuit(kept), 'document')
    if (!checked.ok) return checked
    await putConnectors(trx, organisationId, vehicleId, kept.connectors)
    return succeed({ document: checked.value, changed: [] })
  }
  const replaced = new Set(differing.map(({ id }) => id))
  const users = others.filter((other) => replaced.has(other.connector))
  const broken = users.flatMap((user) => {
    const connector = document.connectors.find(({ id }) => id === user.connector)
    return connector?.cavities != null && user.highest > connector.cavities
      ? [
          `connector ${connectorName(connector)}: circuit "${user.title}" uses cavity ${user.highest}, the new one has ${connector.cavities}`,
        ]
      : []
  })
  if (broken.length > 0)
    return fail('connector-in-use', {
      path: 'document.connectors',
      message: `Not replaced. ${broken.join('; ')}.`,
      details: broken,
    })
  await putConnectors(trx, organisationId, vehicleId, document.connectors)
  return succeed({ document, changed: [...new Set(users.map((user) => user.id))] })
}

/** One sentence a field: `connector C7: cavities 6 in the vehicle, 8 in this document`. */
export function differences(stored: Connector, incoming: Connector): string[] {
  const fields = ['label', 'cavities', 'rows', 'numbering', 'sides', 'location', 'accessMinutes'] as const
  return fields
    .filter(
      (field) => JSON.stringify(comparable(stored[field])) !== JSON.stringify(comparable(incoming[field])),
    )
    .map(
      (field) =>
        `connector ${connectorName(stored)}: ${field} ${shown(stored[field])} in the vehicle, ${shown(incoming[field])} in this document`,
    )
}

/** Sides in one order of keys: the database does not keep the order. */
function comparable(value: Connector[keyof Connector]): unknown {
  return typeof value === 'object' && value !== null ? [value.a, value.b] : value
}

function shown(value: Connector[keyof Connector]): string {
  if (value === null) return 'not stated'
  if (typeof value === 'object') return `${JSON.stringify(value.a)} and ${JSON.stringify(value.b)}`
  return JSON.stringify(value)
}
