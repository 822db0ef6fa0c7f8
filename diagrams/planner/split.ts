import type { Probe } from '../document/reading-schema'
import { ohmmeterLimitOhms } from '../solver/constants'

/** Particles that a reading would show alike. */
export interface Bin {
  /** Smallest and largest figure in it; Infinity for OL, 0 or 1 for a load. */
  low: number
  high: number
  /** Indices of its particles. */
  members: number[]
}

/** How far apart two figures must be to be told apart: meter, and parts a little off the drawing. */
export function resolution(kind: Probe['kind'], value: number): number {
  switch (kind) {
    case 'volts':
      return 0.08 + 0.025 * Math.abs(value)
    case 'ohms':
      return 0.35 + 0.06 * Math.abs(value)
    case 'amps':
      return 0.15 + 0.08 * Math.abs(value)
    default:
      return 0.5
  }
}

/** Sorts particles into what the meter can tell apart. Particles that foretell nothing (NaN) are left out. */
export function binsOf(kind: Probe['kind'], row: Float64Array): Bin[] {
  const shown = kind === 'ohms' ? row.map((value) => (value > ohmmeterLimitOhms ? Infinity : value)) : row
  let least = Infinity
  let most = -Infinity
  for (const value of shown) {
    if (value < least) least = value
    if (value > most) most = value
  }
  // Most readings of most conditions show one thing whatever is wrong: no need to sort those.
  if (!(most - least > resolution(kind, least))) return []
  const sorted = shown.toSorted()
  const bins: Bin[] = []
  let bin: Bin | undefined
  let before = 0
  for (const value of sorted) {
    // NaN sorts last.
    if (Number.isNaN(value)) break
    // A gap parts bins; a long stretch without one is cut as well.
    if (
      !bin ||
      value - before > resolution(kind, before) ||
      value - bin.low > 3 * resolution(kind, bin.low)
    ) {
      bin = { low: value, high: value, members: [] }
      bins.push(bin)
    }
    bin.high = value
    before = value
  }
  for (let i = 0; i < shown.length; i++) {
    const value = shown[i]!
    if (Number.isNaN(value)) continue
    let [low, high] = [0, bins.length - 1]
    while (low < high) {
      const middle = (low + high) >> 1
      if (value <= bins[middle]!.high) high = middle
      else low = middle + 1
    }
    bins[low]!.members.push(i)
  }
  return bins
}

/** Expected drop in entropy over units, bits. `unitOf[i]` numbers the unit of particle i. */
export function bitsOf(
  bins: readonly Bin[],
  weights: Float64Array,
  unitOf: Int32Array,
  units: number,
): number {
  let covered = 0
  const total = new Float64Array(units)
  const inside = new Float64Array(units)
  let conditional = 0
  for (const bin of bins) {
    let mass = 0
    for (const i of bin.members) {
      inside[unitOf[i]!]! += weights[i]!
      total[unitOf[i]!]! += weights[i]!
      mass += weights[i]!
    }
    covered += mass
    let sum = 0
    for (const i of bin.members) {
      const unit = unitOf[i]!
      const part = inside[unit]!
      if (part > 0) sum -= part * Math.log2(part / mass)
      inside[unit] = 0
    }
    conditional += sum
  }
  if (covered <= 0) return 0
  let whole = 0
  for (const part of total) if (part > 0) whole -= part * Math.log2(part / covered)
  return Math.max(0, whole - conditional)
}
