import type { Circuit } from '../document/circuit-schema'
import type { Node } from '../document/node-schema'
import { nodeName } from '../document/points'
import { hasContact, portsOf, splitEnd, wiresByEnd } from '../document/ports'
import { sitesOf } from '../document/sites'
import { halls, type Hall } from './path-halls'
import { hallKey, pathLevels, type Levels } from './path-levels'

export interface Leg {
  /** Its load, or the part it ends in. */
  name: string
  sites: string[]
}

/**
 * Every place of a circuit once, in the order in which current meets it: from the feed along the way it takes; at a
 * branch the leg with the most probability first, then the others as drawn. Legs end at branches. What no feed
 * reaches comes last, in the order of the document.
 */
export function pathOrder(circuit: Circuit, probabilityOf: ReadonlyMap<string, number>): Leg[] {
  const walk = new Walk(circuit, probabilityOf)
  for (const node of circuit.nodes)
    if (node.kind === 'battery' || node.kind === 'feed') walk.enter(node, null, [])
  for (const node of circuit.nodes) if (node.kind === 'module') walk.enter(node, null, [])
  for (const node of circuit.nodes) if (node.kind !== 'ground') walk.enter(node, null, [])
  for (const node of circuit.nodes) walk.enter(node, null, [])
  walk.gather()
  return walk.legs
}

class Walk {
  readonly legs: Leg[] = []
  private readonly nodes: Map<string, Node>
  private readonly byEnd: Map<string, string[]>
  private readonly wires
  private readonly left: Set<string>
  private readonly entered = new Set<string>()
  private readonly levels: Levels

  constructor(
    private readonly circuit: Circuit,
    private readonly probabilityOf: ReadonlyMap<string, number>,
  ) {
    this.nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
    this.wires = new Map(circuit.wires.map((wire) => [wire.id, wire]))
    this.byEnd = wiresByEnd(circuit)
    this.levels = pathLevels(circuit)
    this.left = new Set(sitesOf(circuit).map((site) => site.id))
  }

  /** What no walk reached, such as a wire in a ring of its own: one leg a part or wire. */
  gather(): void {
    for (const wire of this.circuit.wires) {
      const leg: string[] = []
      const near = splitEnd(wire.from)
      const node = this.nodes.get(near.node)
      if (node && this.left.has(`wire:${wire.id}`)) this.take(leg, contactSite(node, near.port))
      if (this.left.has(`wire:${wire.id}`)) this.follow(wire.id, wire.from, leg)
    }
    for (const site of [...this.left]) {
      const id = site.slice(site.indexOf(':') + 1).split('.')[0] ?? ''
      const leg: string[] = []
      this.take(leg, site)
      this.close(leg, this.nodes.get(id) ?? null, null)
    }
  }

  /** Goes along a wire from one of its ends, and on into what stands at the other. */
  follow(wireId: string, from: string, leg: string[]): void {
    const wire = this.wires.get(wireId)
    if (!wire) return
    const far = splitEnd(wire.from === from ? wire.to : wire.from)
    const node = this.nodes.get(far.node)
    if (!this.left.has(`wire:${wireId}`)) return this.close(leg, node ?? null, null)
    this.take(leg, `wire:${wireId}`)
    if (node) this.enter(node, far.port, leg)
    else this.close(leg, null, null)
  }

  /** Goes into a part by a port, through it, and out by every way that is left; with no port it starts there. */
  enter(node: Node, port: string | null, leg: string[]): void {
    if (port !== null) this.take(leg, contactSite(node, port))
    const here = halls(node, port)
    const onward: { hall: Hall; port: string; wire: string }[] = []
    for (const hall of here) {
      const key = hallKey(node, hall)
      for (const site of hall.always) this.take(leg, site)
      if (this.entered.has(key)) continue
      this.entered.add(key)
      for (const site of hall.sites) this.take(leg, site)
      for (const out of hall.exits)
        for (const wire of this.byEnd.get(`${node.id}.${out}`) ?? [])
          if (this.left.has(`wire:${wire}`) && !this.isBackward(key, wire, `${node.id}.${out}`))
            onward.push({ hall, port: out, wire })
    }
    if (onward.length === 0) return this.close(leg, node, port)
    const leave = (way: (typeof onward)[number], along: string[]) => {
      this.take(along, contactSite(node, way.port))
      for (const site of way.hall.exitSites(way.port)) this.take(along, site)
      this.follow(way.wire, `${node.id}.${way.port}`, along)
    }
    if (onward.length === 1) return leave(onward[0] as (typeof onward)[number], leg)
    this.close(leg, node, port)
    // Sums first: walking one way may take places that another way would have led to as well.
    const ways = onward
      .map((way, at) => ({ way, at, weight: this.weightBeyond(way.wire, `${node.id}.${way.port}`) }))
      .toSorted((one, other) => other.weight - one.weight || one.at - other.at)
    for (const { way } of ways) if (this.left.has(`wire:${way.wire}`)) leave(way, [])
  }

  /** True when a wire only leads back to where another feed comes from. */
  private isBackward(from: string, wireId: string, end: string): boolean {
    const wire = this.wires.get(wireId)
    if (!wire) return false
    const far = splitEnd(wire.from === end ? wire.to : wire.from)
    const node = this.nodes.get(far.node)
    const onward = node ? halls(node, far.port) : []
    return (
      onward.length > 0 && onward.every((hall) => this.levels.isBackward(from, hallKey(node as Node, hall)))
    )
  }

  private take(leg: string[], site: string | null): void {
    if (site !== null && this.left.delete(site)) leg.push(site)
  }

  private close(leg: string[], node: Node | null, port: string | null): void {
    if (leg.length === 0) return
    this.legs.push({ name: this.legName(leg, node, port), sites: leg })
  }

  private legName(leg: readonly string[], last: Node | null, port: string | null): string {
    const load = leg
      .filter((site) => site.startsWith('part:'))
      .map((site) => this.nodes.get(site.slice(5)))
      .find((node) => node?.kind === 'load')
    const node = load ?? last
    if (!node) return leg[0] ?? ''
    if (port === null) return nodeName(node)
    if (node.kind === 'module') return `${nodeName(node)} pin ${port}`
    return node.kind === 'dlc' ? `${nodeName(node)} cavity ${port}` : nodeName(node)
  }

  /** Probability of all places still left that a way leads to. */
  private weightBeyond(firstWire: string, from: string): number {
    const seen = new Set<string>()
    let sum = 0
    const count = (site: string | null) => {
      if (site === null || seen.has(site)) return
      seen.add(site)
      if (this.left.has(site)) sum += this.probabilityOf.get(site) ?? 0
    }
    const queue: { wire: string; from: string }[] = [{ wire: firstWire, from }]
    const passed = new Set<string>()
    for (let next = queue.pop(); next; next = queue.pop()) {
      const { wire: id, from: start } = next
      const wire = this.wires.get(id)
      if (!wire || seen.has(`wire:${id}`) || !this.left.has(`wire:${id}`)) continue
      count(`wire:${id}`)
      const far = splitEnd(wire.from === start ? wire.to : wire.from)
      const node = this.nodes.get(far.node)
      if (!node) continue
      count(contactSite(node, far.port))
      for (const hall of halls(node, far.port)) {
        for (const site of hall.always) count(site)
        const key = hallKey(node, hall)
        if (this.entered.has(key) || passed.has(key)) continue
        passed.add(key)
        for (const site of hall.sites) count(site)
        for (const out of hall.exits)
          for (const onward of this.byEnd.get(`${node.id}.${out}`) ?? []) {
            count(contactSite(node, out))
            for (const site of hall.exitSites(out)) count(site)
            queue.push({ wire: onward, from: `${node.id}.${out}` })
          }
      }
    }
    return sum
  }
}

/** The contact a wire meets at a port; a cavity is one contact, whichever side one comes from. */
function contactSite(node: Node, port: string): string | null {
  if (node.kind === 'cavity') return `contact:${node.id}`
  const found = portsOf(node).find((one) => one.name === port)
  return found && hasContact(node, found) ? `contact:${node.id}.${port}` : null
}
