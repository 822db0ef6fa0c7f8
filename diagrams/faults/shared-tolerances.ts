import type { Reading } from '../document/reading-schema'
import type { ScaleRange } from './battery-range'
import { batterySteps, type JudgedReading } from './judged-reading'
import { logSum } from './log-sum'
import { normalBelow, smearedDensity } from './normal'
import { predict, sensitivities, type Prediction } from './prediction'
import { accuracyOf } from './tolerance-rule'

/** A part may be 5 % off the drawing, evenly: its standard deviation. */
const sigmaOfPart = 0.05 / Math.sqrt(3)
/** A reading further off than this many standard deviations is a slip, and says nothing of the parts. */
const slipFrom = 4
/** Stretches of a cell's severities on which readings are taken as straight. */
const stretches = 4

/** A reading that a cell explains, as far as the severity and parts a little off the drawing matter to it. */
interface Share {
  value: number
  /** What the cell foretells at each end of each stretch; one entry where there is no severity. */
  foretold: readonly Prediction[]
  /** The meter's own standard deviation, and what each branch's standard deviation moves the reading by. */
  sigma: number
  moves: Float64Array
}

/**
 * What readings share: the severity and the parts off the drawing are the same ones in all of them. Taking each
 * reading's spread for itself counts one part's error as often as it is read, and lets each reading have a severity
 * of its own. For a cell of the given readings, all with one and the same battery: ln of their joint density over the
 * product of their single ones, each averaged over where the battery may stand,
 *   ∫∫ N(v; p(t, s), C) dt ds  over  ∫ Π ∫ N(v_r; p_r(t, s), C_rr) dt ds,  C = diag(σ²) + S Sᵀ,
 * t the place in the cell on its logarithmic scale, s the battery's, S the moves by part. With `still`, as if every
 * reading lay where it was foretold.
 */
export function sharedLog(
  readings: readonly Reading[],
  judged: readonly JudgedReading[],
  cell: number,
  range: ScaleRange,
  still = false,
): number {
  const shares = readings.flatMap((reading, r) => shareOf(reading, judged[r]!, cell, range, still) ?? [])
  if (shares.length < 2) return 0
  const L = choleskyOf(shares)
  const joint: number[] = []
  const single: number[] = []
  for (let i = 0; i < batterySteps; i++) {
    const scale = range.low + ((i + 0.5) / batterySteps) * (range.high - range.low)
    joint.push(jointLog(shares, L, scale))
    single.push(singleLog(shares, scale))
  }
  return logSum(joint) - logSum(single)
}

function singleLog(shares: readonly Share[], scale: number): number {
  let log = 0
  for (const { value, foretold, sigma, moves } of shares) {
    const own = Math.sqrt(sigma * sigma + dot(moves, moves))
    const density = smearedDensity(value, figure(foretold[0]!, scale), figure(foretold.at(-1)!, scale), own)
    log += Math.log(Math.max(density, 1e-300))
  }
  return log
}

function jointLog(shares: readonly Share[], L: readonly Float64Array[], scale: number): number {
  const n = shares.length
  // In units of the joint spread every error is a standard normal of its own.
  const whitened = (of: (share: Share) => number): Float64Array => {
    const x = Float64Array.from(shares, of)
    for (let i = 0; i < n; i++) {
      for (let k = 0; k < i; k++) x[i]! -= L[i]![k]! * x[k]!
      x[i]! /= L[i]![i]!
    }
    return x
  }
  let log = (-n / 2) * Math.log(2 * Math.PI)
  for (let i = 0; i < n; i++) log -= Math.log(L[i]![i]!)
  const steps = Math.max(...shares.map(({ foretold }) => foretold.length)) - 1
  if (steps === 0) {
    const e = whitened(({ value, foretold }) => value - figure(foretold[0]!, scale))
    return log - dot(e, e) / 2
  }
  const parts = Array.from({ length: steps }, (_, t) => {
    const at = (share: Share, step: number) => figure(share.foretold[step] ?? share.foretold[0]!, scale)
    const e = whitened((share) => share.value - at(share, t))
    const d = whitened((share) => at(share, t + 1) - at(share, t))
    return straightLog(dot(d, d), dot(d, e), dot(e, e))
  })
  return log + logSum(parts) - Math.log(steps)
}

/** ln of ∫₀¹ exp(−(a t² − 2 b t + c) / 2) dt. */
function straightLog(a: number, b: number, c: number): number {
  if (a < 1e-6) return -(c - b) / 2
  const root = Math.sqrt(a)
  const [low, high] = [-b / root, root - b / root]
  // Both ends on one side: by symmetry the left one, where differences of small areas keep their digits.
  const area = low > 0 ? normalBelow(-low) - normalBelow(-high) : normalBelow(high) - normalBelow(low)
  const inside =
    area > 1e-12 ? Math.log(area * Math.sqrt(2 * Math.PI)) : -Math.min(low * low, high * high) / 2
  return -(c - (b * b) / a) / 2 + inside - Math.log(root)
}

/** L of C = L Lᵀ. */
function choleskyOf(shares: readonly Share[]): Float64Array[] {
  const n = shares.length
  const L = Array.from({ length: n }, () => new Float64Array(n))
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      let sum = dot(shares[i]!.moves, shares[j]!.moves) + (i === j ? shares[i]!.sigma ** 2 : 0)
      const own = sum
      for (let k = 0; k < j; k++) sum -= L[i]![k]! * L[j]![k]!
      L[i]![j] = i === j ? Math.sqrt(Math.max(sum, 1e-9 * own)) : sum / L[j]![j]!
    }
  return L
}

function shareOf(
  reading: Reading,
  judged: JudgedReading,
  cell: number,
  range: ScaleRange,
  still: boolean,
): Share | null {
  const { value } = reading
  if (typeof value !== 'number') return null
  const { states, bounds } = judged.table
  let entry = states.first[cell]!
  while (entry < states.first[cell + 1]! && states.low[entry]! < 0) entry++
  if (entry === states.first[cell + 1]) return null
  const [from, to] = [states.low[entry]!, states.high[entry]!]
  const { given, severity: low, states: held } = states.bounds[from]!
  const high = states.bounds[to]!.severity
  const at = (t: number) => given.solve(held, low > 0 ? low * (high / low) ** t : low + t * (high - low), 1)
  const inner = (i: number) => predict(given, at(i / stretches), reading)
  const foretold =
    from === to
      ? [bounds[from]!]
      : Array.from({ length: stretches + 1 }, (_, i) =>
          i === 0 ? bounds[from]! : i === stretches ? bounds[to]! : inner(i),
        )
  const moves = foretold.some(({ live }) => live) ? null : sensitivities(given, at(0.5), reading)
  given.releaseUnit()
  if (!moves) return null
  for (let k = 0; k < moves.length; k++) moves[k]! *= sigmaOfPart
  const { percent, floor } = accuracyOf(reading)
  const sigma = Math.max(1e-6, ((percent / 100) * Math.abs(value) + floor) / 2)
  if (still) return { value: figure(foretold[0]!, (range.low + range.high) / 2), foretold, sigma, moves }
  const reach = slipFrom * Math.sqrt(sigma * sigma + dot(moves, moves))
  const figures = foretold.flatMap((each) => [figure(each, range.low), figure(each, range.high)])
  const outside = value < Math.min(...figures) - reach || value > Math.max(...figures) + reach
  return outside ? null : { value, foretold, sigma, moves }
}

function figure({ battery, fixed }: Prediction, scale: number): number {
  return scale * battery + fixed
}

/** With leads put in a network has a few branches more at its end, which are exact. */
function dot(x: Float64Array, y: Float64Array): number {
  let sum = 0
  for (let i = 0, n = Math.min(x.length, y.length); i < n; i++) sum += x[i]! * y[i]!
  return sum
}
