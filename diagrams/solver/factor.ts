import type { EliminationOrder } from './elimination-order'

/**
 * Subtraction-free LDLᵀ of a nodal conductance matrix (a symmetric M-matrix).
 *
 * Kept are the conductances c(k,i) between unknowns and s(k) from each unknown to chassis, all
 * ≥ 0, in siemens. Eliminating k is the star-mesh step
 *   d(k) = s(k) + Σ c(k,i);  c(i,j) += c(k,i)·c(k,j)/d(k);  s(i) += c(k,i)·s(k)/d(k)
 * which only adds and multiplies positive numbers, so every entry keeps full relative accuracy
 * however badly the matrix is conditioned (Peña, LDU decompositions with L and U well
 * conditioned, 2004). Cost for a tree of n unknowns: O(n).
 */
export interface Factor {
  order: EliminationOrder
  /** As drawn, before any elimination: conductance per slot, and per unknown to chassis. */
  edge: Float64Array
  toChassis: Float64Array
  /** c(k,i) / d(k) per slot. */
  share: Float64Array
  /** d(k) per unknown, siemens. */
  pivot: Float64Array
  /** s(k) per unknown when its turn comes, siemens. */
  leak: Float64Array
}

/** `edge`: conductance per slot; `toChassis`: conductance per unknown. */
export function factorise(order: EliminationOrder, edge: Float64Array, toChassis: Float64Array): Factor {
  const { pivots, first, count, neighbour, firstPair, pairSlot } = order
  const pivot = new Float64Array(order.size)
  const share = edge.slice()
  const leak = toChassis.slice()
  for (let step = 0; step < pivots.length; step++) {
    const k = pivots[step]!
    const from = first[k]!
    const to = from + count[k]!
    let d = leak[k]!
    for (let slot = from; slot < to; slot++) d += share[slot]!
    pivot[k] = d
    let pair = firstPair[k]!
    for (let x = from; x < to; x++) {
      const c = share[x]!
      const part = c / d
      leak[neighbour[x]!]! += part * leak[k]!
      for (let y = x + 1; y < to; y++) share[pairSlot[pair++]!]! += part * share[y]!
    }
    for (let slot = from; slot < to; slot++) share[slot] = share[slot]! / d
  }
  return { order, edge, toChassis, share, pivot, leak }
}

/** Volts for injected currents, in place: `x` holds amperes going in, comes back as volts to chassis. */
export function solveInPlace(factor: Factor, x: Float64Array): Float64Array {
  return substituteBack(factor, gatherCurrents(factor, x))
}

/** First half of solving, in place: amperes as they stand at each pivot when its turn comes. */
export function gatherCurrents(factor: Factor, x: Float64Array): Float64Array {
  const { pivots, first, count, neighbour } = factor.order
  const { share } = factor
  for (let step = 0; step < pivots.length; step++) {
    const k = pivots[step]!
    const current = x[k]!
    if (current === 0) continue
    const from = first[k]!
    for (let slot = from, to = from + count[k]!; slot < to; slot++)
      x[neighbour[slot]!]! += share[slot]! * current
  }
  return x
}

/** Second half, in place: gathered amperes become volts. */
export function substituteBack(factor: Factor, x: Float64Array): Float64Array {
  const { pivots, first, count, neighbour } = factor.order
  const { share, pivot } = factor
  for (let step = pivots.length - 1; step >= 0; step--) {
    const k = pivots[step]!
    const from = first[k]!
    let volts = x[k]! / pivot[k]!
    for (let slot = from, to = from + count[k]!; slot < to; slot++)
      volts += share[slot]! * x[neighbour[slot]!]!
    x[k] = volts
  }
  return x
}
