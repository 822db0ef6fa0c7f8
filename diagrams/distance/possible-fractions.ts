import type { Limits } from './measured'

/**
 * What is known of a wire with a short somewhere along it. Ohm: `near` from one end to the short, `far` from the
 * short to the other end, `difference` near less far, `whole` both together.
 */
export interface PartLimits {
  whole: Limits
  near?: Limits
  far?: Limits
  difference?: Limits
}

/** Rounding must never decide: a part of the whole wire. */
const hair = 1e-9

/**
 * Every place along the wire that agrees with all limits at once, as a part of its length; null when none does.
 *
 * Near and far ohms (u, v) are a point of the plane, every limit a half-plane a·u + b·v ≤ c. They cut a convex polygon
 * out of the quarter where both are positive, and u/(u + v) takes its extremes at its corners, being constant along every
 * ray from the origin. Nothing is left out of the true range, whatever combination of errors made the readings.
 */
export function possibleFractions(limits: PartLimits): Limits | null {
  const most = limits.whole.high
  const slack = hair * most
  let corners: Corner[] = [
    [0, 0],
    [most, 0],
    [most, most],
    [0, most],
  ]
  const keep = (a: number, b: number, within: Limits | undefined) => {
    if (!within) return
    corners = cut(corners, a, b, within.high + slack)
    corners = cut(corners, -a, -b, slack - within.low)
  }
  keep(1, 1, limits.whole)
  keep(1, 0, limits.near)
  keep(0, 1, limits.far)
  keep(1, -1, limits.difference)
  const fractions = corners.filter(([u, v]) => u + v > 0).map(([u, v]) => u / (u + v))
  return fractions.length === 0 ? null : { low: Math.min(...fractions), high: Math.max(...fractions) }
}

type Corner = readonly [number, number]

/** The part of a convex polygon where a·u + b·v ≤ c (Sutherland and Hodgman, Reentrant polygon clipping, 1974). */
function cut(corners: readonly Corner[], a: number, b: number, c: number): Corner[] {
  const over = ([u, v]: Corner) => a * u + b * v - c
  return corners.flatMap((corner, i) => {
    const before = corners.at(i - 1)!
    const [here, there] = [over(corner), over(before)]
    const kept: Corner[] = here <= 0 ? [corner] : []
    if (here <= 0 === there <= 0) return kept
    const part = there / (there - here)
    const crossing: Corner = [
      before[0] + part * (corner[0] - before[0]),
      before[1] + part * (corner[1] - before[1]),
    ]
    return [crossing, ...kept]
  })
}
