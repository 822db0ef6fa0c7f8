import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import type { Node } from '@/diagrams/document/node-schema'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { compiled, solveDense } from './dense-solver'
import type { RestingStates } from './document-deck'
import type { DeckElement } from './ngspice'

/**
 * A second solver, for checking the first: elements written from the page of the circuit format
 * (`documentDeck`), dense elimination, and the page's words on when relays pull in, modules wake and
 * diodes conduct. Slow and plain; shares no code with the product's solver.
 */
export interface Solved {
  volts(net: string): number
  /** Volts per net for one ampere put in at a and taken out at b. */
  perAmpere(a: string, b: string): (net: string) => number
  elements: readonly DeckElement[]
  /** The part each element belongs to; null for what is exact. */
  parts: readonly (string | null)[]
  states: RestingStates
}

/** What one vehicle's parts and battery are multiplied by. Contacts, leads and leaks are as the page has them. */
export interface Factors {
  part(name: string): number
  battery: number
}

/** Lets the parts find their state from everything asleep and released; null when they never rest. */
export function settlePlainly(
  circuit: Circuit,
  condition: Condition,
  factors: Factors,
  blown: ReadonlySet<string>,
  fault?: PlantedFault,
): Solved | null {
  let relays = new Set<string>()
  let modules = new Set<string>()
  let diodes = new Set<string>()
  const seen = new Set<string>()
  for (;;) {
    let solved: Solved | null = null
    for (let round = 0; ; round++) {
      if (round > 60) return null
      solved = solve(circuit, condition, factors, { relays, modules, diodes, blown }, fault)
      const wrong = wrongDiode(circuit, condition, solved)
      if (wrong === null) break
      diodes = new Set(diodes)
      if (!diodes.delete(wrong)) diodes.add(wrong)
    }
    const next = statesOf(circuit, condition, solved, fault)
    if (sameSet(next.relays, relays) && sameSet(next.modules, modules)) return solved
    const key = [...next.relays, '|', ...next.modules].join(' ')
    if (seen.has(key)) return null
    seen.add(key)
    relays = next.relays
    modules = next.modules
  }
}

const sameSet = (a: ReadonlySet<string>, b: ReadonlySet<string>) =>
  a.size === b.size && [...a].every((x) => b.has(x))

/** Volts at the part's side of a port, where it has a connector. */
export function inside(node: Node, port: string): string {
  return node.connector === undefined ? `${node.id}.${port}` : `${node.id}.${port}:part`
}

function statesOf(
  circuit: Circuit,
  condition: Condition,
  { volts }: Solved,
  fault: PlantedFault | undefined,
) {
  const relays = new Set<string>()
  const modules = new Set<string>()
  for (const node of circuit.nodes) {
    if (node.kind === 'relay') {
      const pulled = node.connector === undefined && condition.unplugged.includes(node.id)
      const coil = Math.abs(volts(inside(node, '85')) - volts(inside(node, '86')))
      if (!pulled && fault?.site !== `part:${node.id}.coil` && coil >= node.pullIn) relays.add(node.id)
    }
    if (node.kind === 'module') {
      const ground = innerGround(node)
      const fed = node.pins
        .filter((pin) => pin.circuit.type === 'supply')
        .every((pin) => volts(`I:${node.id}.${pin.pin}`) - volts(ground) >= node.runsFrom)
      if (condition.battery && fed && fault?.site !== `module:${node.id}`) modules.add(node.id)
    }
  }
  return { relays, modules }
}

export function innerGround(node: Extract<Node, { kind: 'module' }>): string {
  return node.pins.some((pin) => pin.circuit.type === 'ground') ? `G:${node.id}` : '0'
}

function wrongDiode(circuit: Circuit, condition: Condition, { volts, states }: Solved): string | null {
  for (const node of circuit.nodes) {
    const check = (name: string, a: string, b: string, limit: number) => {
      const over = volts(inside(node, a)) - volts(inside(node, b))
      const on = states.diodes.has(name)
      if (!condition.battery) return on
      return on ? over < limit - 1e-6 : over > limit + 1e-6
    }
    if (node.kind === 'diode' && check(node.id, 'anode', 'cathode', node.volts)) return node.id
    if (node.kind === 'relay' && node.suppression === 'diode') {
      const pulled = node.connector === undefined && condition.unplugged.includes(node.id)
      if (!pulled && check(`${node.id}.suppression`, '85', '86', 0.7)) return `${node.id}.suppression`
    }
  }
  return null
}

function solve(
  circuit: Circuit,
  condition: Condition,
  factors: Factors,
  states: RestingStates,
  fault: PlantedFault | undefined,
): Solved {
  const deck = compiled(circuit, condition, states, fault)
  const weak = fault?.mode === 'weak'
  const elements = deck.elements.map((element, i) => {
    const part = deck.parts[i]!
    const factor = part === null ? 1 : factors.part(part)
    const scale = deck.supply[i] && !weak ? factors.battery : 1
    return {
      ...element,
      ohms: deck.own[i]! * factor + (element.ohms - deck.own[i]!),
      volts: (element.volts ?? 0) * scale,
    }
  })
  return { ...solveDense(deck, elements), elements, states, parts: deck.parts }
}
