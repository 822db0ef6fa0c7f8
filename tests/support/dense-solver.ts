import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { documentDeck, type RestingStates } from './document-deck'
import type { DeckElement } from './ngspice'

/** One part of the document may be several elements of the deck. */
function partOf(element: string): string | null {
  if (/^(contact|leak|added|short$)/.test(element)) return null
  return element.replace(/ (to|suppression)$/, (_, end: string) => (end === 'to' ? '' : ' suppression'))
}

/** A deck with its nets numbered, and the part of each element's ohms that is its own and not the fault's. */
export interface Compiled {
  elements: DeckElement[]
  parts: (string | null)[]
  own: number[]
  supply: boolean[]
  /** Numbers of both nets, −1 for chassis. */
  ends: [number, number][]
  numberOf(net: string): number
  size: number
}

const keptDecks = new Map<string, Compiled>()
let keptFor: Circuit | undefined

/** The deck of a circuit, kept: a search asks for the same one with other figures again and again. */
export function compiled(
  circuit: Circuit,
  condition: Condition,
  states: RestingStates,
  fault: PlantedFault | undefined,
): Compiled {
  if (keptFor !== circuit || keptDecks.size > 3000) keptDecks.clear()
  keptFor = circuit
  const { relays, modules, diodes, blown } = states
  const key = JSON.stringify([condition, ...[relays, modules, diodes, blown].map((set) => [...set]), fault])
  let found = keptDecks.get(key)
  if (!found) {
    const elements = documentDeck(circuit, condition, states, fault)
    const good = fault && new Map(documentDeck(circuit, condition, states).map((e) => [e.name, e.ohms]))
    const supplies = new Set(
      circuit.nodes.filter((n) => n.kind === 'battery' || n.kind === 'feed').map((n) => `part:${n.id}`),
    )
    found = {
      elements,
      parts: elements.map((e) => partOf(e.name)),
      own: elements.map((e) => Math.min(e.ohms, good?.get(e.name) ?? e.ohms)),
      supply: elements.map((e) => supplies.has(e.name)),
      ...numberNets(elements),
    }
    keptDecks.set(key, found)
  }
  return found
}

/** Nets joined by an element of no ohms are one. */
function numberNets(elements: readonly DeckElement[]) {
  const parent = new Map<string, string>()
  const root = (net: string): string => {
    let at = net
    for (let up = parent.get(at); up !== undefined; up = parent.get(at)) at = up
    return at
  }
  for (const { a, b, ohms } of elements)
    if (ohms === 0 && root(a) !== root(b)) {
      const [kept, gone] = root(a) === '0' ? ['0', root(b)] : [root(b), root(a)]
      parent.set(gone, kept)
    }
  const numbers = new Map<string, number>([['0', -1]])
  const numberOf = (net: string): number => {
    const r = root(net)
    let found = numbers.get(r)
    if (found === undefined) numbers.set(r, (found = numbers.size - 1))
    return found
  }
  const ends = elements.map(({ a, b }): [number, number] => [numberOf(a), numberOf(b)])
  const size = numbers.size - 1
  return { ends, size, numberOf: (net: string) => numbers.get(root(net)) ?? -1 }
}

/** Nodal equations by dense elimination that only adds (each pivot is the sum of what leaves its net). */
export function solveDense({ ends, size: n, numberOf }: Compiled, elements: readonly DeckElement[]) {
  // Between nets; last column to chassis.
  const g = Array.from({ length: n }, () => new Float64Array(n + 1))
  const right = new Float64Array(n)
  elements.forEach(({ ohms, volts }, e) => {
    const [i, j] = ends[e]!
    if (ohms === 0 || i === j) return
    const amps = (volts ?? 0) / ohms
    if (i >= 0) {
      g[i]![j < 0 ? n : j]! += 1 / ohms
      right[i]! += amps
    }
    if (j >= 0) {
      g[j]![i < 0 ? n : i]! += 1 / ohms
      right[j]! -= amps
    }
  })
  const pivot = new Float64Array(n)
  for (let k = 0; k < n; k++) {
    const row = g[k]!
    let sum = 0
    for (let i = k + 1; i <= n; i++) sum += row[i]!
    pivot[k] = sum
    for (let i = k + 1; i < n; i++) {
      const part = row[i]! / sum
      if (part === 0) continue
      const other = g[i]!
      for (let j = k + 1; j <= n; j++) if (j !== i) other[j]! += part * row[j]!
    }
  }
  const backward = (x: Float64Array): Float64Array => {
    for (let k = 0; k < n; k++) {
      if (x[k] === 0) continue
      const part = x[k]! / pivot[k]!
      const row = g[k]!
      for (let i = k + 1; i < n; i++) x[i]! += part * row[i]!
    }
    for (let k = n - 1; k >= 0; k--) {
      let volts = x[k]!
      const row = g[k]!
      for (let i = k + 1; i < n; i++) volts += row[i]! * x[i]!
      x[k] = volts / pivot[k]!
    }
    return x
  }
  const reader = (x: Float64Array) => (net: string) => {
    const i = numberOf(net)
    return i < 0 ? 0 : x[i]!
  }
  return {
    volts: reader(backward(right)),
    perAmpere(a: string, b: string) {
      const currents = new Float64Array(n)
      const [i, j] = [numberOf(a), numberOf(b)]
      if (i >= 0) currents[i]! += 1
      if (j >= 0) currents[j]! -= 1
      return reader(backward(currents))
    },
  }
}
