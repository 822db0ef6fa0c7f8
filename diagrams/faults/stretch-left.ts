import type { Circuit } from '../document/circuit-schema'
import type { Node } from '../document/node-schema'
import { hasContact, portsOf } from '../document/ports'

/** A place as a stretch between two points. */
interface Stretch {
  site: string
  a: string
  b: string
}

/**
 * The two points between which all the places left lie, when they hang together and touch the rest of the circuit
 * at just two points; else null. Points as in the format, a module as its id.
 */
export function stretchLeft(circuit: Circuit, left: ReadonlySet<string>): [string, string] | null {
  let stretches = stretchesByCircuit.get(circuit)
  if (!stretches) stretchesByCircuit.set(circuit, (stretches = stretchesOf(circuit)))
  const inside = stretches.filter(({ site }) => left.has(site))
  if (inside.length < 2) return null
  const points = new Set(inside.flatMap(({ a, b }) => [a, b]))
  const spliced = circuit.nodes.filter((node) => left.has(`part:${node.id}`) && node.kind === 'splice')
  // A place that is no stretch, such as a module as a whole, lies nowhere between.
  const placed = new Set([...inside.map(({ site }) => site), ...spliced.map((node) => `part:${node.id}`)])
  if (placed.size < left.size || spliced.some((node) => !points.has(`${node.id}.s`))) return null
  if (!hangTogether(inside)) return null
  const rims = new Set<string>(points.has('chassis') ? ['chassis'] : [])
  for (const { site, a, b } of stretches)
    if (!left.has(site)) for (const point of [a, b]) if (points.has(point)) rims.add(point)
  const [one, other, ...more] = rims
  return one !== undefined && other !== undefined && more.length === 0 ? [one, other] : null
}

function hangTogether(stretches: readonly Stretch[]): boolean {
  // Union-find: each point leads to another of its piece, the last one to itself.
  const leader = new Map<string, string>()
  const pieceOf = (point: string): string => {
    let at = point
    for (let next = leader.get(at) ?? at; next !== at; next = leader.get(at) ?? at) at = next
    leader.set(point, at)
    return at
  }
  let pieces = 0
  for (const { a, b } of stretches) {
    for (const point of [a, b])
      if (!leader.has(point)) {
        leader.set(point, point)
        pieces++
      }
    const [one, other] = [pieceOf(a), pieceOf(b)]
    if (one === other) continue
    leader.set(one, other)
    pieces--
  }
  return pieces === 1
}

/** Asked with every reading, of a document that does not change. */
const stretchesByCircuit = new WeakMap<Circuit, Stretch[]>()

function stretchesOf(circuit: Circuit): Stretch[] {
  return [
    ...circuit.wires.map((wire) => ({ site: `wire:${wire.id}`, a: wire.from, b: wire.to })),
    ...circuit.nodes.flatMap((node) => [...contactStretches(node), ...partStretches(node)]),
  ]
}

function contactStretches(node: Node): Stretch[] {
  return portsOf(node)
    .filter((port) => hasContact(node, port))
    .map((port) => {
      const end = `${node.id}.${port.name}`
      return { site: `contact:${end}`, a: end, b: `${end}:part` }
    })
}

function partStretches(node: Node): Stretch[] {
  const ports = new Map(portsOf(node).map((port) => [port.name, port]))
  const at = (name: string) => {
    const port = ports.get(name)!
    return `${node.id}.${name}${hasContact(node, port) ? ':part' : ''}`
  }
  const between = (a: string, b: string, tail = '') => [
    { site: `part:${node.id}${tail}`, a: at(a), b: at(b) },
  ]
  switch (node.kind) {
    case 'cavity':
      return [{ site: `contact:${node.id}`, a: at('a'), b: at('b') }]
    case 'fuse':
      return between('in', 'out')
    case 'load':
    case 'resistor':
      return between('a', 'b')
    case 'diode':
      return between('anode', 'cathode')
    case 'battery':
      return between('pos', 'neg')
    case 'ground':
      return [{ site: `part:${node.id}`, a: at('in'), b: 'chassis' }]
    case 'feed':
      return [{ site: `part:${node.id}`, a: 'chassis', b: at('out') }]
    case 'switch':
      return node.contacts.flatMap((contact) => between(contact.a, contact.b, `.${contact.id}`))
    case 'relay':
      return [
        ...between('85', '86', '.coil'),
        ...between('30', '87', '.contact'),
        ...between('30', '87a', '.contact'),
      ]
    case 'module':
      return node.pins
        .filter((pin) => pin.circuit.type !== 'none')
        .map((pin) => ({ site: `pin:${node.id}.${pin.pin}`, a: at(pin.pin), b: node.id }))
    case 'splice':
    case 'dlc':
      return []
  }
}
