/**
 * Symbolic part of the sparse factorisation: in which order unknowns are eliminated and which
 * pairs of neighbours each elimination joins. Once per topology.
 *
 * Minimum degree (Tinney and Walker, Direct solutions of sparse network equations by optimally
 * ordered triangular factorization, Proc. IEEE 55, 1967). A harness is nearly a tree, so almost
 * every pivot has one or two neighbours left.
 */
export interface EliminationOrder {
  /** Unknowns, n of them, numbered 0 … n − 1. */
  size: number
  /** Pivots in the order they are eliminated, length n. */
  pivots: Int32Array
  /** Slots of pivot k (by unknown) are `first[k]` … `first[k] + count[k] − 1`. */
  first: Int32Array
  count: Int32Array
  /** The neighbour each slot leads to. */
  neighbour: Int32Array
  /** For pivot k with m slots, m(m − 1)/2 slots that receive the joined pairs, from `firstPair[k]`. */
  firstPair: Int32Array
  pairSlot: Int32Array
  /** Slot of the edge between two unknowns. */
  slotOf(a: number, b: number): number
}

/** `edges` holds unknown pairs (a, b), a ≠ b; doubles are allowed. */
export function orderElimination(size: number, edges: readonly [number, number][]): EliminationOrder {
  const neighbours: Set<number>[] = Array.from({ length: size }, () => new Set())
  for (const [a, b] of edges) {
    neighbours[a]!.add(b)
    neighbours[b]!.add(a)
  }
  const pivots = new Int32Array(size)
  const first = new Int32Array(size)
  const count = new Int32Array(size)
  const columns: number[][] = Array.from({ length: size }, () => [])
  const done = new Uint8Array(size)
  // Buckets by degree; an entry may be stale and is then skipped.
  const buckets: number[][] = []
  const file = (k: number) => {
    const degree = neighbours[k]!.size
    ;(buckets[degree] ??= []).push(k)
  }
  for (let k = size - 1; k >= 0; k--) file(k)
  for (let step = 0, lowest = 0; step < size; ) {
    const bucket = buckets[lowest]
    const k = bucket?.pop()
    if (k === undefined) {
      lowest++
      continue
    }
    if (done[k] || neighbours[k]!.size !== lowest) continue
    done[k] = 1
    pivots[step++] = k
    const around = [...neighbours[k]!]
    columns[k] = around
    for (const i of around) neighbours[i]!.delete(k)
    for (let x = 0; x < around.length; x++)
      for (let y = x + 1; y < around.length; y++) {
        neighbours[around[x]!]!.add(around[y]!)
        neighbours[around[y]!]!.add(around[x]!)
      }
    for (const i of around) {
      file(i)
      lowest = Math.min(lowest, neighbours[i]!.size)
    }
  }
  let slots = 0
  let pairs = 0
  const firstPair = new Int32Array(size)
  for (const k of pivots) {
    first[k] = slots
    count[k] = columns[k]!.length
    slots += columns[k]!.length
    firstPair[k] = pairs
    pairs += (columns[k]!.length * (columns[k]!.length - 1)) / 2
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
  return { size, pivots, first, count, neighbour, firstPair, pairSlot, slotOf }
}
