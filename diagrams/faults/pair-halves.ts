import { ends, plain, type PairBox, type Range } from './pair-box'
import { BoxCorner, type AskedReading } from './pair-corner'
import type { PairSolver } from './pair-solver'
import { accuracyOf } from './tolerance-rule'

/** Nearer to each other than this many standard deviations, the ends of a box are as good as one. */
const fineDeviations = 5
/** Severities nearer than this to each other are not told apart. */
const finePart = 1.1
/** A weak battery's volts are gone through within a box. */
const finePartWeak = 1.25

/** How much a box may still gain by being halved. */
export interface BoxSpread {
  /** Deviations between the ends of either fault's stretch, of the reading moved the most. */
  held: number
  swept: number
  /** ln of how much likelier the readings may be at the best spot in the box than in all of it. */
  gain: number
}

export function spreadOf(solver: PairSolver, box: PairBox, asked: readonly AskedReading[]): BoxSpread {
  const { held, swept, corners } = box
  const spread = { held: 0, swept: 0, gain: 0 }
  const last = corners.length - 1
  // Corners run through the swept fault's ends first.
  const step = swept[0] === swept[1] ? 1 : 2
  for (const one of asked) {
    const effect = (x: number, y: number) => apart(solver, one, corners[x]!, corners[y]!)
    const bySwept = step === 2 ? Math.max(effect(0, 1), effect(last - 1, last)) : 0
    const byHeld = held[0] === held[1] ? 0 : Math.max(effect(0, step), effect(last - step, last))
    spread.swept = Math.max(spread.swept, bySwept)
    spread.held = Math.max(spread.held, byHeld)
    // A density of 1 over the width against the normal one's peak.
    spread.gain += Math.log(Math.max(1, Math.max(bySwept, byHeld) / Math.sqrt(2 * Math.PI)))
  }
  return spread
}

/** Halves a box across the fault whose severity moves some reading the most; null when that is too little to matter. */
export function halvesOf(box: PairBox, spread: BoxSpread): [PairBox, PairBox] | null {
  const { pair, held, swept, corners } = box
  const which = spread.held > spread.swept ? 'held' : 'swept'
  if (spread[which] < fineDeviations) return null
  const [low, high] = box[which]
  const weak = pair[which].mode === 'weak'
  if (low <= 0 || high / low < (weak ? finePartWeak : finePart)) return null
  const middle = weak ? (low + high) / 2 : Math.sqrt(low * high)
  const logPrior = box.logPrior - Math.LN2
  const half = (range: Range, own: BoxCorner[]): PairBox => ({
    ...box,
    [which]: range,
    corners: own,
    logPrior,
  })
  const step = swept[0] === swept[1] ? 1 : 2
  if (which === 'held') {
    const between = ends(swept).map((s) => new BoxCorner(pair, middle, s))
    return [
      half([low, middle], [...corners.slice(0, step), ...between]),
      half([middle, high], [...between, ...corners.slice(-step)]),
    ]
  }
  const between = ends(held).map((h) => new BoxCorner(pair, h, middle))
  const side = (of: 0 | 1) => ends(held).map((_, h) => corners[2 * h + of]!)
  return [
    half(
      [low, middle],
      between.flatMap((corner, h) => [side(0)[h]!, corner]),
    ),
    half(
      [middle, high],
      between.flatMap((corner, h) => [corner, side(1)[h]!]),
    ),
  ]
}

/** How far apart two corners are for a reading, in standard deviations. */
function apart(solver: PairSolver, asked: AskedReading, x: BoxCorner, y: BoxCorner): number {
  const [one, other] = [x.settle(solver, asked), y.settle(solver, asked)]
  // Where the circuit comes to rest otherwise at one end, or not at all, something happens in between.
  if (one?.settledKey !== other?.settledKey) return fineDeviations
  if (!one) return 0
  const [a, b] = [x, y].map((corner) => corner.predict(solver, asked, one.settledKey, one.settled)!)
  const [low, high] = [Math.min(plain(a!), plain(b!)), Math.max(plain(a!), plain(b!))]
  const { reading } = asked
  if (typeof reading.value === 'number') {
    const { percent, floor } = accuracyOf(reading)
    const limit = (percent / 100) * Math.abs(reading.value) + floor
    return (high - low) / Math.sqrt((limit / 2) ** 2 + ((a!.spread + b!.spread) / 2) ** 2)
  }
  // What only has to lie within a window is as good anywhere in it.
  const inside = asked.windows.some((window) => low >= window.low && high <= window.high)
  return inside ? 0 : fineDeviations
}
