import type { Circuit } from '../document/circuit-schema'
import type { Node } from '../document/node-schema'
import { portsOf, splitEnd, wiresByEnd } from '../document/ports'
import { halls, type Hall } from './path-halls'

export interface Levels {
  /** True when going from one hall to the next would run against the current: towards another feed. */
  isBackward: (from: string, to: string) => boolean
}

/** A consumer stands for as much of the way as ten joints: most of the voltage is lost there. */
const loadSteps = 10

export function hallKey(node: Node, hall: Hall): string {
  return `${node.id} ${hall.name}`
}

/**
 * Which way current takes, without solving: steps from the nearest feed and steps to the nearest ground, found by
 * two searches over the parts. Good enough to put places in order; what really flows is the solver's business.
 */
export function pathLevels(circuit: Circuit): Levels {
  const forward = new Map<string, Set<string>>()
  const backward = new Map<string, Set<string>>()
  const cost = new Map<string, number>()
  const feeds: string[] = []
  const sinks: string[] = []
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const wires = new Map(circuit.wires.map((wire) => [wire.id, wire]))
  const byEnd = wiresByEnd(circuit)
  const link = (map: Map<string, Set<string>>, from: string, to: string) => {
    const known = map.get(from)
    if (known) known.add(to)
    else map.set(from, new Set([to]))
  }
  for (const node of circuit.nodes) {
    const every = [null, ...portsOf(node).map((port) => port.name)].flatMap((port) => halls(node, port))
    for (const hall of every) {
      const key = hallKey(node, hall)
      cost.set(key, node.kind === 'load' || node.kind === 'resistor' ? loadSteps : 1)
      if (node.kind === 'battery' || node.kind === 'feed') feeds.push(key)
      if (node.kind === 'ground' || isSink(node, hall)) sinks.push(key)
      for (const port of hall.exits)
        for (const id of byEnd.get(`${node.id}.${port}`) ?? []) {
          const wire = wires.get(id)
          if (!wire) continue
          const far = splitEnd(wire.from === `${node.id}.${port}` ? wire.to : wire.from)
          const next = nodes.get(far.node)
          for (const onward of next ? halls(next, far.port) : []) {
            link(forward, key, hallKey(next as Node, onward))
            link(backward, hallKey(next as Node, onward), key)
          }
        }
    }
  }
  const fromFeed = distances(feeds, forward, cost)
  const toGround = distances(sinks, backward, cost)
  const height = (key: string) => {
    const above = fromFeed.get(key)
    const below = toGround.get(key)
    return above === undefined || below === undefined || above + below === 0 ? null : below / (above + below)
  }
  return {
    isBackward: (from, to) => {
      const [here, there] = [height(from), height(to)]
      if (here === null || there === null || there <= here) return false
      // What is fed through here lies onward, however near to ground it is.
      return (fromFeed.get(to) as number) < (fromFeed.get(from) as number) + (cost.get(from) as number)
    },
  }
}

function isSink(node: Node, hall: Hall): boolean {
  if (node.kind !== 'module') return false
  return node.pins.some(
    (pin) => hall.name === `pin ${pin.pin}` && ['ground', 'low-side', 'pull-down'].includes(pin.circuit.type),
  )
}

/** Fewest steps from any start, each hall costing its own: Dijkstra with a plain queue, circuits are small. */
function distances(
  starts: readonly string[],
  links: ReadonlyMap<string, ReadonlySet<string>>,
  cost: ReadonlyMap<string, number>,
): Map<string, number> {
  const found = new Map(starts.map((start) => [start, 0]))
  let edge = [...new Set(starts)]
  while (edge.length > 0) {
    const next = new Set<string>()
    for (const here of edge) {
      const so = (found.get(here) as number) + (cost.get(here) ?? 1)
      for (const there of links.get(here) ?? [])
        if (so < (found.get(there) ?? Number.POSITIVE_INFINITY)) {
          found.set(there, so)
          next.add(there)
        }
    }
    edge = [...next]
  }
  return found
}
