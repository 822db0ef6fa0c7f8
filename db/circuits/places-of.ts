import type { Circuit, Wire } from '@/diagrams/document/circuit-schema'
import type { Node, NodeKind } from '@/diagrams/document/node-schema'
import { connectorName, nodeName, pointName } from '@/diagrams/document/points'
import { portsOf, splitEnd, wiresByEnd } from '@/diagrams/document/ports'
import { type ColourKey, colourKey, textKey } from './search-keys'

/** A wire where the search shows it. */
export interface Place {
  wire: string
  side: 'from' | 'to'
  /** Null: the wire meets no connector at either end. */
  connector: string | null
  connector_key: string
  /** Cavity; 0 without a connector. */
  number: number
  colour_base: string
  colour_stripe: string
  carries: string
}

/** Sorts wires that meet no connector after all that do. */
const afterConnectors = '~'

/**
 * One place for every end of a wire in a cavity. The second side of an inline cavity is left out when its wire
 * looks like the first one's, since both are the same line; a wire without any cavity is one place of its own.
 */
export function placesOf(circuit: Circuit): Place[] {
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const connectors = new Map(circuit.connectors.map((connector) => [connector.id, connector]))
  const wires = new Map(circuit.wires.map((wire) => [wire.id, wire]))
  const byEnd = wiresByEnd(circuit)
  // "SW5 to K3 86, coil feed": what lies at both ends of the line, through the cavity, and its signal.
  const carries = (wire: Wire, side: 'from' | 'to') => {
    const here = splitEnd(wire[side])
    let near = wire[side]
    if (nodes.get(here.node)?.kind === 'cavity') {
      const through = `${here.node}.${here.port === 'a' ? 'b' : 'a'}`
      const beyond = wires.get(byEnd.get(through)?.[0] ?? '')
      if (beyond) near = beyond.from === through ? beyond.to : beyond.from
    }
    // The order in which the document draws the line: from first.
    const [first, last] = side === 'from' ? [near, wire.to] : [wire.from, near]
    const [one, other] = [first, last].map((end) => endName(circuit, nodes.get(splitEnd(end).node), end))
    const line = `${one} to ${other}`
    return wire.signal ? `${line}, ${wire.signal}` : line
  }
  const shown = new Set<string>()
  const places: Place[] = []
  const landing = circuit.wires.flatMap((wire) =>
    (['from', 'to'] as const).map((side) => ({ wire, side, end: splitEnd(wire[side]) })),
  )
  // Side a of an inline cavity before side b, whatever the order of the wires.
  landing.sort((x, y) => Number(x.end.port === 'b') - Number(y.end.port === 'b'))
  const placed = new Set<string>()
  for (const { wire, side, end } of landing) {
    const node = nodes.get(end.node)
    const port = node && portsOf(node).find((candidate) => candidate.name === end.port)
    const connector = port?.connector == null ? undefined : connectors.get(port.connector)
    if (!node || !connector || port?.cavity == null) continue
    placed.add(wire.id)
    const colour = colourKey(wire.colour)
    if (node.kind === 'cavity') {
      const line = `${node.id} ${colour.base}/${colour.stripe}`
      const sameSide = `${line} ${end.port}`
      if (shown.has(line) && !shown.has(sameSide)) continue
      shown.add(line).add(sameSide)
    }
    places.push({
      ...keysOf(wire, side, colour),
      connector: connector.id,
      connector_key: textKey(connectorName(connector)),
      number: port.cavity,
      carries: carries(wire, side),
    })
  }
  for (const wire of circuit.wires)
    if (!placed.has(wire.id))
      places.push({
        ...keysOf(wire, 'from', colourKey(wire.colour)),
        connector: null,
        connector_key: afterConnectors,
        number: 0,
        carries: carries(wire, 'from'),
      })
  return places
}

function keysOf(wire: Wire, side: 'from' | 'to', colour: ColourKey) {
  return { wire: wire.id, side, colour_base: colour.base, colour_stripe: colour.stripe }
}

/** Pins and cavities by number; of parts with a plain way in and out, the part's name alone. */
function endName(circuit: Circuit, node: Node | undefined, end: string): string {
  return node && plainKinds.has(node.kind) ? nodeName(node) : pointName(circuit, end).replace(/,.*$/, '')
}
const plainKinds = new Set<NodeKind>([
  'battery',
  'feed',
  'ground',
  'splice',
  'fuse',
  'load',
  'resistor',
  'diode',
  'switch',
])
