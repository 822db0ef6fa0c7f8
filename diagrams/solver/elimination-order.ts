import { inflows, type Inflows } from './inflows'

/**
 * Symbolic part of the sparse factorisation: in which order unknowns are eliminated and which
 * pairs of neighbours each elimination joins. Once per topology.
 *
 * Minimum degree (Tinney and Walker, Direct solutions of sparse network equations by optimally
 * ordered triangular factorization, Proc. IEEE 55, 1967), where one and two neighbours count alike
 * and the unknown with the least stacked below it goes first. A harness is nearly a tree, so almost
 * every pivot has one or two neighbours left, and a long run of wires and joints folds up in halves:
 * from any unknown it is a short way to the last pivot.
 */
export interface EliminationOrder {
  /** Unknowns, n of them, numbered 0 … n − 1. */
  size: number
  /** Pivots in the order they are eliminated, length n. */
  pivots: Int32Array
  lastToFirst: Int32Array
  /** Place of each unknown in that order. */
  step: Int32Array
  /** Slots of pivot k (by unknown) are `first[k]` … `first[k] + count[k] − 1`. */
  first: Int32Array
  count: Int32Array
  /** The neighbour each slot leads to. */
  neighbour: Int32Array
  /** The neighbour of pivot k that is eliminated next; −1 at the end. All its other neighbours lie on the way from there. */
  parent: Int32Array
  /** For pivot k with m slots, m(m − 1)/2 slots that receive the joined pairs, from `firstPair[k]`. */
  firstPair: Int32Array
  pairSlot: Int32Array
  /** The same told from the receiving side. */
  inflows: Inflows
  /** Slot of the edge between two unknowns. */
  slotOf(a: number, b: number): number
}

/** `edges` holds unknown pairs (a, b), a ≠ b; doubles are allowed. */
export function orderElimination(size: number, edges: readonly [number, number][]): EliminationOrder {
  const { pivots, columns } = eliminate(size, edges)
  const step = new Int32Array(size)
  pivots.forEach((k, at) => {
    step[k] = at
  })
  const first = new Int32Array(size)
  const count = new Int32Array(size)
  const firstPair = new Int32Array(size)
  const parent = new Int32Array(size).fill(-1)
  let slots = 0
  let pairs = 0
  for (const k of pivots) {
    const column = columns[k]!
    first[k] = slots
    count[k] = column.length
    slots += column.length
    firstPair[k] = pairs
    pairs += (column.length * (column.length - 1)) / 2
    for (const i of column) if (parent[k]! < 0 || step[i]! < step[parent[k]!]!) parent[k] = i
  }
  const neighbour = new Int32Array(slots)
  const slotByPair = new Map<number, number>()
  for (const k of pivots)
    columns[k]!.forEach((i, at) => {
      neighbour[first[k]! + at] = i
      slotByPair.set(k * size + i, first[k]! + at)
    })
  const slotOf = (a: number, b: number): number => {
    const slot = slotByPair.get(a * size + b) ?? slotByPair.get(b * size + a)
    if (slot === undefined) throw new Error(`no edge between unknowns ${a} and ${b}`)
    return slot
  }
  const pairSlot = new Int32Array(pairs)
  for (const k of pivots) {
    let at = firstPair[k]!
    const around = columns[k]!
    for (let x = 0; x < around.length; x++)
      for (let y = x + 1; y < around.length; y++) pairSlot[at++] = slotOf(around[x]!, around[y]!)
  }
  const lastToFirst = pivots.toReversed()
  const order = {
    size,
    pivots,
    lastToFirst,
    step,
    first,
    count,
    neighbour,
    parent,
    firstPair,
    pairSlot,
    slotOf,
  }
  return { ...order, inflows: inflows(order) }
}

/** The given unknowns and all on their way to the last pivot, from the last to the first. */
export function wayToLast({ parent, step }: EliminationOrder, unknowns: readonly number[]): Int32Array {
  const wanted = new Set<number>()
  for (const unknown of unknowns)
    for (let k = unknown; k >= 0 && !wanted.has(k); k = parent[k]!) wanted.add(k)
  return Int32Array.from(wanted).sort((x, y) => step[y]! - step[x]!)
}

/** Pivots in order, and for each unknown the neighbours it has left when its turn comes. */
function eliminate(
  size: number,
  edges: readonly [number, number][],
): { pivots: Int32Array; columns: number[][] } {
  const neighbours: Set<number>[] = Array.from({ length: size }, () => new Set())
  for (const [a, b] of edges) {
    neighbours[a]!.add(b)
    neighbours[b]!.add(a)
  }
  const pivots = new Int32Array(size)
  const columns: number[][] = Array.from({ length: size }, () => [])
  const height = new Int32Array(size)
  const done = new Uint8Array(size)
  // Queues by degree, then by height; an entry may be stale and is then skipped.
  const queues: { list: number[]; from: number }[][] = []
  const degreeOf = (k: number) => Math.max(2, neighbours[k]!.size)
  let lowest = 2
  const file = (k: number) => {
    const degree = degreeOf(k)
    lowest = Math.min(lowest, degree)
    const byHeight = (queues[degree] ??= [])
    ;(byHeight[height[k]!] ??= { list: [], from: 0 }).list.push(k)
  }
  const next = (): number => {
    for (; ; lowest++)
      for (const queue of queues[lowest] ?? [])
        while (queue && queue.from < queue.list.length) {
          const k = queue.list[queue.from++]!
          if (!done[k] && degreeOf(k) === lowest && queues[lowest]![height[k]!] === queue) return k
        }
  }
  for (let k = 0; k < size; k++) file(k)
  for (let step = 0; step < size; step++) {
    const k = next()
    done[k] = 1
    pivots[step] = k
    const around = [...neighbours[k]!]
    columns[k] = around
    for (const i of around) neighbours[i]!.delete(k)
    for (let x = 0; x < around.length; x++)
      for (let y = x + 1; y < around.length; y++) {
        neighbours[around[x]!]!.add(around[y]!)
        neighbours[around[y]!]!.add(around[x]!)
      }
    for (const i of around) {
      height[i] = Math.max(height[i]!, height[k]! + 1)
      file(i)
    }
  }
  return { pivots, columns }
}
