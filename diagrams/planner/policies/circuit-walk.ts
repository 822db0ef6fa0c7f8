import type { Circuit } from '../../document/circuit-schema'
import type { Node } from '../../document/node-schema'
import { portsOf, splitEnd, wiresByEnd } from '../../document/ports'

/** A point of the harness, met on the way from the feeds. Behind it lie the steps `step` to `last`. */
export interface Stop {
  point: string
  step: number
  last: number
}

/** A circuit as one walks it: from each feed along its wires and through its parts, to grounds and modules. */
export interface CircuitWalk {
  /** In the order of the walk. */
  stops: Stop[]
  /** Where along the walk a place lies: behind the stops whose steps hold it. */
  stepOf(site: string): number
}

/** Walks a circuit depth first, each point once. What no feed reaches comes last, as drawn. */
export function walkCircuit(circuit: Circuit): CircuitWalk {
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const wired = wiresByEnd(circuit)
  const wires = new Map(circuit.wires.map((wire) => [wire.id, wire]))
  const stops: Stop[] = []
  const met = new Map<string, Stop>()

  const next = (point: string): string[] => {
    const { node: id, port } = splitEnd(point)
    const along = (wired.get(point) ?? []).map((wireId) => {
      const wire = wires.get(wireId)!
      return wire.from === point ? wire.to : wire.from
    })
    return [...along, ...throughPart(nodes.get(id)!, port).map((other) => `${id}.${other}`)]
  }
  /** With its own stack: a chain of thousands of parts would exhaust the machine's. */
  const walkFrom = (start: string) => {
    const path: { stop: Stop; ahead: string[] }[] = []
    const enter = (point: string) => {
      const stop = { point, step: stops.length, last: stops.length }
      stops.push(stop)
      met.set(point, stop)
      path.push({ stop, ahead: next(point) })
    }
    enter(start)
    for (let here = path.at(-1); here; here = path.at(-1)) {
      const point = here.ahead.shift()
      if (point === undefined) {
        path.pop()
        here.stop.last = stops.length - 1
      } else if (!met.has(point) && wired.has(point)) enter(point)
    }
  }
  const sources = circuit.nodes.flatMap((node) =>
    node.kind === 'battery' ? [`${node.id}.pos`] : node.kind === 'feed' ? [`${node.id}.out`] : [],
  )
  const all = circuit.nodes.flatMap((node) => portsOf(node).map((port) => `${node.id}.${port.name}`))
  for (const point of [...sources, ...all]) if (wired.has(point) && !met.has(point)) walkFrom(point)

  const stepAt = (point: string) => met.get(point)?.step
  const between = (points: readonly string[]): number => {
    const steps = points.flatMap((point) => stepAt(point) ?? [])
    // Just before the further of its ends, so that it lies behind the nearer one only.
    return steps.length > 1 ? Math.max(...steps) - 0.5 : (steps[0] ?? stops.length) + 0.5
  }
  const stepOf = (site: string): number => {
    const rest = site.slice(site.indexOf(':') + 1)
    const wire = site.startsWith('wire:') && wires.get(rest)
    if (wire) return between([wire.from, wire.to])
    const node = nodes.get(rest.split('.')[0]!)
    if (!node) return stops.length
    if (node.kind !== 'cavity' && met.has(rest)) return stepAt(rest)! + 0.5
    const contact = node.kind === 'switch' && node.contacts.find((c) => `${node.id}.${c.id}` === rest)
    if (contact) return between([`${node.id}.${contact.a}`, `${node.id}.${contact.b}`])
    if (rest === `${node.id}.coil`) return between([`${node.id}.85`, `${node.id}.86`])
    if (rest === `${node.id}.contact`) return between([`${node.id}.30`, `${node.id}.87`])
    const ports = portsOf(node).map((port) => `${node.id}.${port.name}`)
    return node.kind === 'module' ? between(ports.slice(0, 1)) : between(ports)
  }
  return { stops, stepOf }
}

/** Ports that a current entering at one port can leave by. A module and a ground end the walk. */
function throughPart(node: Node, port: string): string[] {
  switch (node.kind) {
    case 'module':
    case 'ground':
    case 'feed':
    case 'battery':
    case 'dlc':
      return []
    case 'relay': {
      const coil = ['85', '86']
      return (coil.includes(port) ? coil : ['30', '87', '87a']).filter((other) => other !== port)
    }
    case 'switch':
      return node.contacts.flatMap(({ a, b }) => (a === port ? [b] : b === port ? [a] : []))
    default:
      return portsOf(node)
        .map((p) => p.name)
        .filter((other) => other !== port)
  }
}
