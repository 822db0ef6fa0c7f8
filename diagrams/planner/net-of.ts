import type { Circuit } from '../document/circuit-schema'
import { splitEnd, wiresByEnd } from '../document/ports'

/** Every end that wires, splices and inline contacts join to a point: what a lead put there also reaches. */
export function netOf(circuit: Circuit, point: string): string[] {
  const wired = wiresByEnd(circuit)
  if (!wired.has(point)) return []
  const wires = new Map(circuit.wires.map((wire) => [wire.id, wire]))
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const found = new Set([point])
  // A set visits what is put in while it is walked.
  for (const end of found) {
    for (const id of wired.get(end) ?? []) {
      const wire = wires.get(id)!
      found.add(wire.from === end ? wire.to : wire.from)
    }
    const { node, port } = splitEnd(end)
    if (nodes.get(node)?.kind === 'cavity') found.add(`${node}.${port === 'a' ? 'b' : 'a'}`)
  }
  return [...found]
}
