import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Node } from '@/diagrams/document/node-schema'
import { wireOhms } from '@/diagrams/solver/build-network'
import { nominalBatteryVolts } from '@/diagrams/solver/constants'

/**
 * A vehicle as it really is: every resistance the document holds, contacts aside, within 5 % of the
 * drawing, the battery at `batteryVolts` (for 12.6 V nominal). `random` gives numbers in [0, 1).
 * `corners` puts every resistance at one end of its range.
 */
export function perturbCircuit(
  circuit: Circuit,
  batteryVolts: number,
  random: () => number,
  corners = false,
): Circuit {
  const off = (ohms: number) => ohms * (corners ? (random() < 0.5 ? 0.95 : 1.05) : 0.95 + 0.1 * random())
  const scale = batteryVolts / nominalBatteryVolts
  const perturbNode = (node: Node): Node => {
    switch (node.kind) {
      case 'battery':
      case 'feed':
        return { ...node, volts: node.volts * scale, ohms: off(node.ohms) }
      case 'ground':
      case 'resistor':
        return { ...node, ohms: off(node.ohms) }
      case 'load':
        return { ...node, ohms: off(node.ohms), coldOhms: off(node.coldOhms ?? node.ohms) }
      case 'relay':
        return { ...node, coilOhms: off(node.coilOhms) }
      case 'module':
        return {
          ...node,
          pins: node.pins.map((pin) => {
            const inner = pin.circuit
            if ('ohms' in inner) return { ...pin, circuit: { ...inner, ohms: off(inner.ohms) } }
            if ('onOhms' in inner) return { ...pin, circuit: { ...inner, onOhms: off(inner.onOhms) } }
            return pin
          }),
        }
      default:
        return node
    }
  }
  return {
    ...circuit,
    nodes: circuit.nodes.map(perturbNode),
    wires: circuit.wires.map((wire) => ({ ...wire, ohms: off(wireOhms(wire)) })),
  }
}
