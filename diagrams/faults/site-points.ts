import type { Circuit } from '../document/circuit-schema'
import { portsOf, splitEnd } from '../document/ports'

/** The two points between which a break of this place would lie; null where leads cannot enclose it. */
export function siteEnds(circuit: Circuit, site: string): [string, string] | null {
  const { kind, id, tail, node } = parts(circuit, site)
  if (kind === 'wire') {
    const wire = circuit.wires.find((w) => w.id === id)
    return wire ? [wire.from, wire.to] : null
  }
  if (kind === 'contact') return node?.kind === 'cavity' ? [`${id}.a`, `${id}.b`] : null
  if (kind !== 'part') return null
  switch (node?.kind) {
    case 'fuse':
      return [`${id}.in`, `${id}.out`]
    case 'load':
    case 'resistor':
      return [`${id}.a`, `${id}.b`]
    case 'diode':
      return [`${id}.anode`, `${id}.cathode`]
    case 'ground':
      return [`${id}.in`, 'chassis']
    case 'switch': {
      const contact = node.contacts.find((c) => c.id === tail)
      return contact ? [`${id}.${contact.a}`, `${id}.${contact.b}`] : null
    }
    case 'relay':
      return tail === 'coil' ? [`${id}.86`, `${id}.85`] : [`${id}.30`, `${id}.87`]
    default:
      return null
  }
}

/** Points at a place, chassis left out. */
export function sitePoints(circuit: Circuit, site: string): string[] {
  const ends = siteEnds(circuit, site)
  if (ends) return ends.filter((end) => end !== 'chassis')
  const { kind, id, tail, node } = parts(circuit, site)
  if (!node) return []
  if (kind === 'contact' || kind === 'pin') return [`${id}.${tail}`]
  return portsOf(node).map((port) => `${id}.${port.name}`)
}

/** How many wires and parts lie between a place and each point; points that nothing joins to it are left out. */
export function hopsFrom(circuit: Circuit, site: string): Map<string, number> {
  const beside = new Map<string, string[]>()
  const join = (a: string, b: string) => {
    for (const [here, there] of [
      [a, b],
      [b, a],
    ] as const) {
      const list = beside.get(here)
      if (list) list.push(there)
      else beside.set(here, [there])
    }
  }
  for (const wire of circuit.wires) join(wire.from, wire.to)
  for (const node of circuit.nodes)
    for (const port of portsOf(node)) join(`${node.id}.${port.name}`, `${node.id}#`)
  const hops = new Map<string, number>()
  let ring = sitePoints(circuit, site)
  for (let distance = 0; ring.length > 0; distance++) {
    const next: string[] = []
    for (const point of ring) {
      if (hops.has(point)) continue
      hops.set(point, distance)
      next.push(...(beside.get(point) ?? []))
    }
    ring = next
  }
  return hops
}

function parts(circuit: Circuit, site: string) {
  const colon = site.indexOf(':')
  const rest = site.slice(colon + 1)
  const { node: id, port: tail } = rest.includes('.') ? splitEnd(rest) : { node: rest, port: '' }
  return { kind: site.slice(0, colon), id, tail, node: circuit.nodes.find((n) => n.id === id) }
}
