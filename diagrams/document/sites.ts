import type { Circuit } from './circuit-schema'
import type { ModulePin } from './pin-circuit-schema'
import { connectorName, nodeName, pointName } from './points'
import { hasContact, portsOf, wiresByEnd } from './ports'

export const modes = [
  'open',
  'resistive',
  'short-to-ground',
  'short-to-supply',
  'short-to-wire',
  'blown',
  'shorted',
  'weak',
  'stuck-open',
  'stuck-closed',
  'dead',
  'stuck-on',
] as const
export type Mode = (typeof modes)[number]

/** A place that can be at fault, and the ways in which it can be. */
export interface Site {
  /** As in `wire:w3`, `contact:c7-2`, `part:f3`, `part:sw1.hi`, `part:k3.coil`, `pin:ecm.14`, `module:ecm`. */
  id: string
  modes: Mode[]
}

/** Wires that lie beside a wire in a connector or part, so that the two can touch. */
export function neighbourWires(circuit: Circuit, wireId: string): string[] {
  let known = neighboursByCircuit.get(circuit)
  if (!known) neighboursByCircuit.set(circuit, (known = findNeighbours(circuit)))
  return known.get(wireId) ?? []
}

/** Asked for every wire, again and again, of a document that does not change. */
const neighboursByCircuit = new WeakMap<Circuit, Map<string, string[]>>()

function findNeighbours(circuit: Circuit): Map<string, string[]> {
  const byEnd = wiresByEnd(circuit)
  const beside = new Map<string, Set<string>>(circuit.wires.map((wire) => [wire.id, new Set()]))
  for (const [a, b] of endsBeside(circuit))
    for (const x of byEnd.get(a) ?? [])
      for (const y of byEnd.get(b) ?? [])
        if (x !== y) {
          beside.get(x)!.add(y)
          beside.get(y)!.add(x)
        }
  return new Map(circuit.wires.map((wire) => [wire.id, [...beside.get(wire.id)!]]))
}

/** Wires that have a neighbour at all. Which ones is not asked: where many share two ends, those are many times many. */
function wiresWithNeighbours(circuit: Circuit, byEnd: ReadonlyMap<string, readonly string[]>): Set<string> {
  const found = new Set<string>()
  for (const [a, b] of endsBeside(circuit)) {
    const [here, there] = [byEnd.get(a) ?? [], byEnd.get(b) ?? []]
    if (here.length === 0 || there.length === 0) continue
    // A wire from one of the two ends to the other is no neighbour of its own.
    for (const [wires, others] of [
      [here, there],
      [there, here],
    ] as const)
      for (const wire of wires) if (others.length > 1 || others[0] !== wire) found.add(wire)
  }
  return found
}

/**
 * Pairs of ends that lie beside each other: in neighbouring cavities of one connector on the same side (an
 * inline connector has two harness sides, a part's connector one), or in neighbouring ports of a part.
 */
function endsBeside(circuit: Circuit): [string, string][] {
  const pairs: [string, string][] = []
  const endAt = new Map<string, string>()
  for (const node of circuit.nodes)
    for (const port of portsOf(node))
      if (port.connector !== null && port.cavity !== null)
        endAt.set(
          cavityKey(port.connector, node.kind === 'cavity' ? port.name : 'part', port.cavity),
          `${node.id}.${port.name}`,
        )
  for (const node of circuit.nodes)
    portsOf(node).forEach((port, index, ports) => {
      const end = `${node.id}.${port.name}`
      if (port.connector !== null && port.cavity !== null) {
        const face = node.kind === 'cavity' ? port.name : 'part'
        const beside = endAt.get(cavityKey(port.connector, face, port.cavity + 1))
        if (beside !== undefined) pairs.push([end, beside])
      }
      const next = ports[index + 1]
      if (next && node.kind !== 'cavity') pairs.push([end, `${node.id}.${next.name}`])
    })
  return pairs
}

function cavityKey(connector: string, face: string, cavity: number): string {
  return `${connector}/${face}/${cavity}`
}

/** Every site of a circuit with its modes, in the order of the document. Only ports that have a wire are sites. */
export function sitesOf(circuit: Circuit): Site[] {
  const byEnd = wiresByEnd(circuit)
  const hasNeighbour = wiresWithNeighbours(circuit, byEnd)
  const sites: Site[] = []
  const hasSupply = circuit.nodes.some((node) => node.kind === 'battery' || node.kind === 'feed')
  for (const wire of circuit.wires)
    sites.push({
      id: `wire:${wire.id}`,
      modes: [
        'open',
        'resistive',
        'short-to-ground',
        ...(hasSupply ? (['short-to-supply'] as const) : []),
        ...(hasNeighbour.has(wire.id) ? (['short-to-wire'] as const) : []),
      ],
    })
  for (const node of circuit.nodes) {
    const wired = portsOf(node).filter((port) => byEnd.has(`${node.id}.${port.name}`))
    if (wired.length === 0) continue
    const isWired = (name: string) => wired.some((port) => port.name === name)
    if (node.kind === 'cavity') {
      sites.push({ id: `contact:${node.id}`, modes: ['open', 'resistive'] })
      continue
    }
    for (const port of wired)
      if (hasContact(node, port))
        sites.push({ id: `contact:${node.id}.${port.name}`, modes: ['open', 'resistive'] })
    const part = `part:${node.id}`
    switch (node.kind) {
      case 'fuse':
        sites.push({ id: part, modes: ['blown', 'resistive'] })
        break
      case 'load':
      case 'resistor':
      case 'diode':
        sites.push({ id: part, modes: ['open', 'resistive', 'shorted'] })
        break
      case 'ground':
      case 'splice':
      case 'feed':
        sites.push({ id: part, modes: ['open', 'resistive'] })
        break
      case 'battery':
        sites.push({ id: part, modes: ['open', 'resistive', 'shorted', 'weak'] })
        break
      case 'switch':
        for (const contact of node.contacts)
          if (isWired(contact.a) && isWired(contact.b))
            sites.push({ id: `${part}.${contact.id}`, modes: ['stuck-open', 'stuck-closed', 'resistive'] })
        break
      case 'relay':
        if (isWired('85') && isWired('86')) sites.push({ id: `${part}.coil`, modes: ['open', 'shorted'] })
        if (isWired('30') && (isWired('87') || isWired('87a')))
          sites.push({ id: `${part}.contact`, modes: ['stuck-open', 'stuck-closed', 'resistive'] })
        break
      case 'module': {
        for (const pin of node.pins)
          if (isWired(pin.pin) && pin.circuit.type !== 'none')
            sites.push({ id: `pin:${node.id}.${pin.pin}`, modes: pinModes(pin) })
        if (node.pins.some(drivesSomething)) sites.push({ id: `module:${node.id}`, modes: ['dead'] })
        break
      }
    }
  }
  return sites
}

function pinModes(pin: ModulePin): Mode[] {
  const found: Mode[] = ['open', 'resistive']
  const circuit = pin.circuit
  if (circuit.type === 'pull-up') found.push('dead')
  if (circuit.type === 'low-side' || circuit.type === 'high-side' || circuit.type === 'source') {
    found.push('dead')
    if (circuit.on !== 'always') found.push('stuck-on')
  }
  return found
}

/** True for a pin that only acts while its module is awake. */
export function drivesSomething(pin: ModulePin): boolean {
  return ['pull-up', 'low-side', 'high-side', 'source'].includes(pin.circuit.type)
}

/** A site in the trade's words: "wire from F12 to C210 cavity 4", "C12 cavity 3", "K3 coil". */
export function siteName(circuit: Circuit, id: string): string {
  const colon = id.indexOf(':')
  const kind = id.slice(0, colon)
  const rest = id.slice(colon + 1)
  const dot = rest.indexOf('.')
  const nodeId = dot < 0 ? rest : rest.slice(0, dot)
  const tail = dot < 0 ? '' : rest.slice(dot + 1)
  if (kind === 'wire') {
    const wire = circuit.wires.find((w) => w.id === rest)
    return wire ? `wire ${endName(circuit, wire.from)} to ${endName(circuit, wire.to)}` : id
  }
  const node = circuit.nodes.find((n) => n.id === nodeId)
  if (!node) return id
  if (node.kind === 'cavity') {
    const connector = circuit.connectors.find((c) => c.id === node.connector)
    return `${connector ? connectorName(connector) : node.connector} cavity ${node.number}`
  }
  switch (kind) {
    case 'contact':
      return `contact at ${pointName(circuit, rest)}`
    case 'pin':
      return `${nodeName(node)} pin ${tail}`
    default:
      return tail ? `${nodeName(node)} ${tail}` : nodeName(node)
  }
}

/** The end of a wire, short enough for a list: the part's name, with its pin or cavity where it has several. */
function endName(circuit: Circuit, end: string): string {
  const name = pointName(circuit, end)
  return name.includes(' cavity ') ? name.replace(/,.*$/, '') : name
}
