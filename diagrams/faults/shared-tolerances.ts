import type { Reading } from '../document/reading-schema'
import type { JudgedReading } from './judged-reading'
import { sensitivities, type Prediction } from './prediction'
import { accuracyOf } from './tolerance-rule'

/** A part may be 5 % off the drawing, evenly: its standard deviation. */
const sigmaOfPart = 0.05 / Math.sqrt(3)
/** A reading further off than this many standard deviations is a slip, and says nothing of the parts. */
const slipFrom = 4

/** A reading that a cell explains, as far as parts a little off the drawing matter to it. */
interface Share {
  /** What is left between the reading and what the cell foretells, and the meter's own standard deviation. */
  left: number
  sigma: number
  /** What each branch's standard deviation moves it by. */
  moves: Float64Array
}

/**
 * What two readings share: the parts off the drawing, and the severity, are the same ones in both. Taking each
 * reading's spread for itself counts one part's error as often as it is read. For a cell of the given readings: ln of their joint density
 * over the product of their single ones,
 *   −½ (ln det C − Σ ln Cᵢᵢ + eᵀ C⁻¹ e − Σ eᵢ²/Cᵢᵢ),  C = diag(σ²) + S Sᵀ,
 * S the moves by part and by severity; with `still`, the determinants alone, as if every reading lay where it was foretold.
 */
export function sharedLog(
  readings: readonly Reading[],
  judged: readonly JudgedReading[],
  cell: number,
  scale: number,
  still = false,
): number {
  const shares = readings.flatMap((reading, r) => shareOf(reading, judged[r]!, cell, scale) ?? [])
  const n = shares.length
  if (n < 2) return 0
  // Cholesky: C = L Lᵀ, row by row; L⁻¹ e as it goes.
  const L = Array.from({ length: n }, () => new Float64Array(n))
  const solved = new Float64Array(n)
  let log = 0
  for (let i = 0; i < n; i++) {
    const { left, sigma, moves } = shares[i]!
    let own = 0
    let rest = left
    for (let j = 0; j <= i; j++) {
      let sum = dot(moves, shares[j]!.moves) + (i === j ? sigma * sigma : 0)
      if (i === j) own = sum
      for (let k = 0; k < j; k++) sum -= L[i]![k]! * L[j]![k]!
      if (i === j) L[i]![i] = Math.sqrt(Math.max(sum, 1e-12 * own))
      else {
        L[i]![j] = sum / L[j]![j]!
        rest -= L[i]![j]! * solved[j]!
      }
    }
    solved[i] = rest / L[i]![i]!
    log -= Math.log(L[i]![i]!) - Math.log(own) / 2
    if (!still) log -= (solved[i]! ** 2 - left ** 2 / own) / 2
  }
  return log
}

function shareOf(reading: Reading, judged: JudgedReading, cell: number, scale: number): Share | null {
  const { value } = reading
  if (typeof value !== 'number') return null
  const { states, bounds } = judged.table
  let entry = states.first[cell]!
  while (entry < states.first[cell + 1]! && states.low[entry]! < 0) entry++
  if (entry === states.first[cell + 1]) return null
  const [from, to] = [states.low[entry]!, states.high[entry]!]
  const [a, b] = [valueAt(bounds[from]!, scale), valueAt(bounds[to]!, scale)]
  const { given, severity, states: held } = states.bounds[from]!
  const other = states.bounds[to]!.severity
  const middle = severity > 0 && other > 0 ? Math.sqrt(severity * other) : (severity + other) / 2
  const byPart = sensitivities(given, given.solve(held, middle, scale), reading)
  given.releaseUnit()
  if (!byPart) return null
  const moves = new Float64Array(byPart.length + 1)
  moves.set(byPart)
  for (let k = 0; k < moves.length; k++) moves[k]! *= sigmaOfPart
  // The severity, somewhere in the cell, is one more thing that readings share: even over its width.
  moves[moves.length - 1] = (b - a) / Math.sqrt(12)
  const { percent, floor } = accuracyOf(reading)
  const sigma = ((percent / 100) * Math.abs(value) + floor) / 2
  const left = value - (a + b) / 2
  return Math.abs(left) > slipFrom * Math.sqrt(sigma * sigma + dot(moves, moves))
    ? null
    : { left, sigma, moves }
}

function valueAt({ battery, fixed }: Prediction, scale: number): number {
  return scale * battery + fixed
}

/**
 * With leads put in a network has a few branches more, which are exact; the severity's move stands last of all.
 */
function dot(x: Float64Array, y: Float64Array): number {
  let sum = x.at(-1)! * y.at(-1)!
  for (let i = 0, n = Math.min(x.length, y.length) - 1; i < n; i++) sum += x[i]! * y[i]!
  return sum
}
