import type { Circuit } from '@/diagrams/document/circuit-schema'
import { hasContact, portsOf } from '@/diagrams/document/ports'

/** What makes a wiring harness one, in figures: worked out from the document alone. */
export interface HarnessShape {
  /** Wires that are the only way between their ends through copper, over all wires. */
  bridges: number
  /** Independent loops of copper alone, a node of the document. */
  copperLoops: number
  /** Independent loops through copper and parts, chassis left out, a node. */
  partLoops: number
  /** Wires at each splice. */
  spliceWires: number[]
  /** Wires in each piece of loom between contacts and parts, splices inside it. */
  wiresPerPiece: number[]
  /** From each part's port, the wires to the next contact on the way, the fewest. */
  wiresToContact: number[]
}

export function shapeOf(circuit: Circuit): HarnessShape {
  const copper = new Joints()
  const pieces = new Joints()
  const withParts = new Joints()
  for (const node of circuit.nodes) {
    const ends = portsOf(node).map((port) => `${node.id}.${port.name}`)
    if (node.kind === 'cavity') copper.join(ends[0]!, ends[1]!)
    if (node.kind !== 'ground' && node.kind !== 'feed')
      for (const end of ends.slice(1)) withParts.join(ends[0]!, end)
  }
  for (const wire of circuit.wires) {
    copper.join(wire.from, wire.to, wire.id)
    withParts.join(wire.from, wire.to, wire.id)
    pieces.join(wire.from, wire.to, wire.id)
  }
  const bridges = copper.bridges()
  return {
    bridges: circuit.wires.filter((wire) => bridges.has(wire.id)).length / circuit.wires.length,
    copperLoops: copper.loops() / circuit.nodes.length,
    partLoops: withParts.loops() / circuit.nodes.length,
    spliceWires: circuit.nodes
      .filter((node) => node.kind === 'splice')
      .map((node) => copper.degree(`${node.id}.s`)),
    wiresPerPiece: pieces.groups().map((group) => group.wires),
    wiresToContact: distances(circuit, pieces),
  }
}

/** Breadth first from every contact, wires counted. */
function distances(circuit: Circuit, pieces: Joints): number[] {
  const isContact = new Set<string>()
  const isPart: string[] = []
  for (const node of circuit.nodes)
    for (const port of portsOf(node)) {
      const end = `${node.id}.${port.name}`
      if (node.kind === 'cavity' || hasContact(node, port)) isContact.add(end)
      else if (node.kind !== 'splice' && pieces.degree(end) > 0) isPart.push(end)
    }
  return isPart.map((start) => {
    const seen = new Set([start])
    let edge = [start]
    for (let wires = 0; edge.length > 0; wires++) {
      if (edge.some((end) => isContact.has(end))) return wires
      edge = edge.flatMap((end) => pieces.beside(end)).filter((end) => !seen.has(end) && seen.add(end))
    }
    return Infinity
  })
}

class Joints {
  private readonly at = new Map<string, { to: string; wire: string | null }[]>()
  private edges = 0

  join(a: string, b: string, wire: string | null = null) {
    this.edges++
    for (const [from, to] of [
      [a, b],
      [b, a],
    ] as const) {
      const list = this.at.get(from)
      if (list) list.push({ to, wire })
      else this.at.set(from, [{ to, wire }])
    }
  }
  degree(end: string): number {
    return this.at.get(end)?.length ?? 0
  }
  beside(end: string): string[] {
    return (this.at.get(end) ?? []).map((x) => x.to)
  }
  groups(): { wires: number }[] {
    const seen = new Set<string>()
    return [...this.at.keys()].flatMap((start) => {
      if (seen.has(start)) return []
      let ends = 0
      const queue = [start]
      seen.add(start)
      for (let end = queue.pop(); end !== undefined; end = queue.pop()) {
        ends += this.degree(end)
        for (const next of this.beside(end)) if (!seen.has(next) && seen.add(next)) queue.push(next)
      }
      return [{ wires: ends / 2 }]
    })
  }
  loops(): number {
    return this.edges - this.at.size + this.groups().length
  }
  /** Wires whose removal parts their ends: those that a depth-first walk finds no way back around (Tarjan, 1974). */
  bridges(): Set<string> {
    const found = new Set<string>()
    const order = new Map<string, number>()
    const low = new Map<string, number>()
    const walk = (end: string, by: { wire: string | null; from: string } | null) => {
      order.set(end, order.size)
      let lowest = order.get(end)!
      let back = false
      for (const { to, wire } of this.at.get(end)!) {
        // One way back along the edge it came by does not count; a second one does.
        if (by && to === by.from && wire === by.wire && !back) {
          back = true
          continue
        }
        if (order.has(to)) lowest = Math.min(lowest, order.get(to)!)
        else {
          walk(to, { wire, from: end })
          lowest = Math.min(lowest, low.get(to)!)
          if (wire !== null && low.get(to)! > order.get(end)!) found.add(wire)
        }
      }
      low.set(end, lowest)
    }
    for (const end of this.at.keys()) if (!order.has(end)) walk(end, null)
    return found
  }
}
