import type { EliminationOrder } from './elimination-order'
import type { Factor } from './factor'

const scratch = new WeakMap<
  EliminationOrder,
  { marks: Uint8Array; flow: Float64Array; volts: Float64Array }
>()

/**
 * Volts for one ampere put in at p and taken out at q (−1 is chassis), right only at p, q, `pivots` and what lies on
 * the way from them to the last pivot. `pivots` runs from the last to the first, none left out on their way. The
 * array comes back changed at the next call for the same order.
 */
export function unitNear(factor: Factor, p: number, q: number, pivots: Int32Array): Float64Array {
  const { order, share, pivot } = factor
  const { first, count, neighbour, parent, step } = order
  let found = scratch.get(order)
  if (!found)
    scratch.set(
      order,
      (found = {
        marks: new Uint8Array(order.size),
        flow: new Float64Array(order.size),
        volts: new Float64Array(order.size),
      }),
    )
  const { marks, flow, volts } = found
  const way: number[] = []
  let [x, y] = [p, q]
  // Both ways to the last pivot, in the order of elimination.
  while (x >= 0 || y >= 0) {
    const k = y < 0 || (x >= 0 && step[x]! <= step[y]!) ? x : y
    way.push(k)
    marks[k] = 1
    flow[k] = 0
    if (x === k) x = parent[k]!
    if (y === k) y = parent[k]!
  }
  if (p >= 0) flow[p]! += 1
  if (q >= 0) flow[q]! -= 1
  for (const k of way) {
    const current = flow[k]!
    if (current === 0) continue
    for (let slot = first[k]!, to = slot + count[k]!; slot < to; slot++)
      flow[neighbour[slot]!]! += share[slot]! * current
  }
  for (let at = way.length - 1; at >= 0; at--) {
    const k = way[at]!
    let v = flow[k]! / pivot[k]!
    for (let slot = first[k]!, to = slot + count[k]!; slot < to; slot++)
      v += share[slot]! * volts[neighbour[slot]!]!
    volts[k] = v
  }
  for (const k of pivots) {
    if (marks[k]) continue
    let v = 0
    for (let slot = first[k]!, to = slot + count[k]!; slot < to; slot++)
      v += share[slot]! * volts[neighbour[slot]!]!
    volts[k] = v
  }
  for (const k of way) marks[k] = 0
  return volts
}
