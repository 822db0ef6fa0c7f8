import type { Circuit } from './circuit-schema'
import { positionsIn } from './condition'
import type { Condition } from './condition-schema'
import { connectorName, nodeName, pointName } from './points'

/** Ohm from which an added lead is a stand-in for a load and no longer a plain lead. */
const standInFromOhms = 1
/** A test lamp of 3 W on 12 V. */
export const testLampOhms = 48
/** A fused lead, clips and all. */
export const fusedLeadOhms = 0.05

/** "Key on, C7 unplugged, F3 pulled, battery disconnected": what differs from the vehicle as one finds it. */
export function conditionParts(circuit: Circuit, condition: Condition): string[] {
  const positions = positionsIn(circuit, condition.controls)
  const parts = circuit.controls
    .filter((control) => positions[control.id] !== control.rest)
    .map((control) => `${control.label || control.id} ${positions[control.id]}`)
  if (!condition.battery) parts.push('battery disconnected')
  for (const id of condition.unplugged) parts.push(unpluggedWords(circuit, id))
  if (condition.charging) parts.push('engine running')
  for (const lead of condition.added) parts.push(addedWords(circuit, lead))
  return parts
}

function unpluggedWords(circuit: Circuit, id: string): string {
  const connector = circuit.connectors.find((c) => c.id === id)
  if (connector) return `${connectorName(connector)} unplugged`
  const node = circuit.nodes.find((n) => n.id === id)
  return `${node ? nodeName(node) : id} pulled`
}

/** "fused lead from K3 30 to K3 87", "test lamp from C7 cavity 2, dash side to chassis". */
export function addedWords(circuit: Circuit, { from, to, ohms }: Condition['added'][number]): string {
  const what =
    ohms < standInFromOhms
      ? 'fused lead'
      : ohms === testLampOhms
        ? 'test lamp'
        : `stand-in load of ${Number(ohms.toPrecision(3))} ohm`
  return `${what} from ${pointName(circuit, from)} to ${pointName(circuit, to)}`
}
