import type { Circuit } from './circuit-schema'
import type { Node } from './node-schema'

/** One place on a part where a wire lands. */
export interface Port {
  /** Name on its node, as in `node.port`. */
  name: string
  /** Connector through which this port meets its wires, or null when there is no contact in between. */
  connector: string | null
  /** Cavity of that connector, or null when the document does not say. */
  cavity: number | null
}

/** Only what was written: a port may be called like something that every object has. */
function cavityOf(node: Node, port: string): number | undefined {
  return node.cavities && Object.hasOwn(node.cavities, port) ? node.cavities[port] : undefined
}

/** Every port of a node, in the order the format lists them. */
export function portsOf(node: Node): Port[] {
  const connector = node.connector ?? null
  const plain = (name: string): Port => ({
    name,
    connector,
    cavity: cavityOf(node, name) ?? null,
  })
  switch (node.kind) {
    case 'battery':
      return [plain('pos'), plain('neg')]
    case 'feed':
      return [plain('out')]
    case 'ground':
      return [plain('in')]
    case 'fuse':
      return [plain('in'), plain('out')]
    case 'switch':
      return [...new Set(node.contacts.flatMap((contact) => [contact.a, contact.b]))].map(plain)
    case 'relay':
      return ['85', '86', '30', '87', '87a'].map(plain)
    case 'load':
    case 'resistor':
      return [plain('a'), plain('b')]
    case 'diode':
      return [plain('anode'), plain('cathode')]
    case 'splice':
      return [plain('s')]
    case 'cavity':
      // Both are harness sides: the contact lies between them, not behind them.
      return ['a', 'b'].map((name) => ({ name, connector: node.connector, cavity: node.number }))
    case 'module':
      return node.pins.map((pin) => {
        const of = pin.connector ?? connector
        return {
          name: pin.pin,
          connector: of,
          cavity: of === null ? null : (pin.cavity ?? wholeNumber(pin.pin)),
        }
      })
    case 'dlc':
      return Array.from({ length: 16 }, (_, i) => ({
        ...plain(String(i + 1)),
        cavity: cavityOf(node, String(i + 1)) ?? i + 1,
      }))
  }
}

/** True when a contact stands between the wire at this port and the part. */
export function hasContact(node: Node, port: Port): boolean {
  return node.kind !== 'cavity' && port.connector !== null
}

function wholeNumber(text: string): number | null {
  return /^[1-9][0-9]{0,2}$/.test(text) ? Number(text) : null
}

/** Node and port of `node.port`; ids and ports hold no dots. */
export function splitEnd(end: string): { node: string; port: string } {
  const dot = end.indexOf('.')
  return { node: end.slice(0, dot), port: end.slice(dot + 1) }
}

/** The wires that land on each `node.port`. */
export function wiresByEnd(circuit: Circuit): Map<string, string[]> {
  const byEnd = new Map<string, string[]>()
  for (const wire of circuit.wires)
    for (const end of [wire.from, wire.to]) {
      const list = byEnd.get(end)
      if (list) list.push(wire.id)
      else byEnd.set(end, [wire.id])
    }
  return byEnd
}
