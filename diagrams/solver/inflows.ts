/**
 * What reaches an unknown and a slot from pivots eliminated before: lets a few pivots be worked out
 * anew by sums alone, the rest of a factorisation kept.
 */
export interface Inflows {
  /** Pivot that each slot belongs to. */
  owner: Int32Array
  /** Slots that lead to unknown k: `given[firstGiven[k]]` … `given[firstGiven[k + 1] − 1]`. */
  firstGiven: Int32Array
  given: Int32Array
  /** Joined pairs that a slot receives, as two slots of one pivot each. */
  firstJoined: Int32Array
  joinedX: Int32Array
  joinedY: Int32Array
}

/** The part of an elimination order that they follow from. */
interface Slots {
  size: number
  pivots: Int32Array
  first: Int32Array
  count: Int32Array
  neighbour: Int32Array
  firstPair: Int32Array
  pairSlot: Int32Array
}

export function inflows(order: Slots): Inflows {
  const { size, pivots, first, count, neighbour, firstPair, pairSlot } = order
  const slots = neighbour.length
  const owner = new Int32Array(slots)
  for (const k of pivots) owner.fill(k, first[k]!, first[k]! + count[k]!)
  const firstGiven = starts(size, neighbour)
  const given = new Int32Array(slots)
  const atGiven = firstGiven.slice()
  for (let slot = 0; slot < slots; slot++) given[atGiven[neighbour[slot]!]!++] = slot
  const firstJoined = starts(slots, pairSlot)
  const joinedX = new Int32Array(pairSlot.length)
  const joinedY = new Int32Array(pairSlot.length)
  const atJoined = firstJoined.slice()
  for (const k of pivots) {
    let pair = firstPair[k]!
    const from = first[k]!
    const to = from + count[k]!
    for (let x = from; x < to; x++)
      for (let y = x + 1; y < to; y++) {
        const at = atJoined[pairSlot[pair++]!]!++
        joinedX[at] = x
        joinedY[at] = y
      }
  }
  return { owner, firstGiven, given, firstJoined, joinedX, joinedY }
}

/** Where each key's entries start when sorted by key; one more for the end. */
function starts(keys: number, entries: Int32Array): Int32Array {
  const found = new Int32Array(keys + 1)
  for (const key of entries) found[key + 1]!++
  for (let key = 0; key < keys; key++) found[key + 1]! += found[key]!
  return found
}
