/** Readings and suspects as figures: all that playing out needs to know. */
export interface Game {
  /** Outcome of each reading for each suspect, from 0 up; −1 where it foretells nothing. */
  outcomes: readonly ArrayLike<number>[]
  /** Probability of each suspect, and the number of the place or group it belongs to. */
  weights: ArrayLike<number>
  unitOf: ArrayLike<number>
  units: number
  /** A place is found when it holds this part of what is left; 1: when no other is left. */
  foundFrom: number
  /** What a reading costs after the readings of `path`. */
  costOf(reading: number, path: readonly number[]): number
}

/** Outcomes rarer than this are not played out, and readings worth less are not taken. */
const leastOutcome = 0.004
const leastBits = 0.02
/** Readings after which a run is broken off; the doubt left is then paid at the rate of the run so far. */
const deepest = 8

/**
 * The reading to take first, by playing out what would follow: each of the `most` best by bits for their cost is
 * taken in thought, then for every outcome the best one by the same measure, until one place is found. The one
 * with the least expected cost to the end wins (a rollout: one step of improvement over the step-by-step choice).
 * −1 when no reading tells anything.
 *
 * Cost: most × outcomes played out × readings × suspects. Against the exact optimum of small instances:
 * `tests/support/optimal-tree.test.ts`.
 */
export function bestByPlayingOut(game: Game, most = 16): number {
  const runs = new Runs(game)
  const all = Int32Array.from({ length: game.weights.length }, (_, i) => i)
  const ranked = runs.ranked(all, []).slice(0, most)
  let best = -1
  let least = Infinity
  for (const reading of ranked) {
    const cost = runs.costAfter(reading, all, [], least)
    if (cost < least - 1e-9) {
      least = cost
      best = reading
    }
  }
  return best
}

class Runs {
  /** Mass by outcome and unit, cleared after each use. */
  private readonly joint: Float64Array
  private readonly touched: Int32Array
  private readonly outcomeMass: Float64Array

  constructor(private readonly game: Game) {
    let mostOutcomes = 1
    for (const outcome of game.outcomes)
      for (let i = 0; i < outcome.length; i++) mostOutcomes = Math.max(mostOutcomes, outcome[i]! + 1)
    this.outcomeMass = new Float64Array(mostOutcomes)
    this.joint = new Float64Array(mostOutcomes * game.units)
    this.touched = new Int32Array(game.weights.length)
  }

  /** Readings that tell something, best bits for their cost first. */
  ranked(left: Int32Array, path: readonly number[]): number[] {
    return this.game.outcomes
      .map((_, reading) => ({ reading, worth: this.worth(reading, left, path) }))
      .filter(({ worth }) => worth > 0)
      .toSorted((a, b) => b.worth - a.worth)
      .map(({ reading }) => reading)
  }

  private worth(reading: number, left: Int32Array, path: readonly number[]): number {
    const bits = this.bits(reading, left)
    return bits < leastBits ? 0 : bits / this.game.costOf(reading, path)
  }

  /** Expected cost to the end once a reading is taken; may stop counting once it is over `enough`. */
  costAfter(reading: number, left: Int32Array, path: readonly number[], enough = Infinity): number {
    const { outcomes, weights } = this.game
    const outcome = outcomes[reading]!
    const parts: number[][] = []
    let whole = 0
    for (const i of left) {
      const shown = outcome[i]!
      if (shown < 0) continue
      whole += weights[i]!
      ;(parts[shown] ??= []).push(i)
    }
    const after = [...path, reading]
    let cost = this.game.costOf(reading, path)
    for (const part of parts) {
      if (!part) continue
      let mass = 0
      for (const i of part) mass += weights[i]!
      if (mass < leastOutcome * whole) continue
      cost += (mass / whole) * this.costFrom(Int32Array.from(part), after)
      if (cost > enough) return cost
    }
    return cost
  }

  private costFrom(left: Int32Array, path: readonly number[]): number {
    const { doubt, most } = this.doubtIn(left)
    if (most >= this.game.foundFrom - 1e-9) return 0
    let best = -1
    let bestWorth = 0
    if (path.length < deepest)
      for (let reading = 0; reading < this.game.outcomes.length; reading++) {
        if (path.includes(reading)) continue
        const worth = this.worth(reading, left, path)
        if (worth > bestWorth) {
          bestWorth = worth
          best = reading
        }
      }
    if (best >= 0) return this.costAfter(best, left, path)
    // Nothing parts the rest: what is left is left whichever reading came first.
    return path.length < deepest ? 0 : doubt * this.game.costOf(path.at(-1)!, path.slice(0, -1))
  }

  /** Doubt over units, bits, and the part of the largest one. */
  private doubtIn(left: Int32Array): { doubt: number; most: number } {
    const { weights, unitOf } = this.game
    let count = 0
    let mass = 0
    for (const i of left) {
      const unit = unitOf[i]!
      if (this.joint[unit] === 0) this.touched[count++] = unit
      this.joint[unit]! += weights[i]!
      mass += weights[i]!
    }
    let [doubt, most] = [0, 0]
    for (let t = 0; t < count; t++) {
      const part = this.joint[this.touched[t]!]! / mass
      this.joint[this.touched[t]!] = 0
      if (part <= 0) continue
      doubt -= part * Math.log2(part)
      most = Math.max(most, part)
    }
    return { doubt, most }
  }

  /** Drop in doubt that a reading is expected to bring: H(unit) − H(unit | outcome) over those it speaks of. */
  private bits(reading: number, left: Int32Array): number {
    const { outcomes, weights, unitOf, units } = this.game
    const outcome = outcomes[reading]!
    let first = -1
    let differs = false
    for (const i of left) {
      const shown = outcome[i]!
      if (shown < 0) continue
      if (first < 0) first = shown
      else if (shown !== first) {
        differs = true
        break
      }
    }
    if (!differs) return 0
    let count = 0
    let whole = 0
    const spoken: number[] = []
    for (const i of left) {
      const shown = outcome[i]!
      if (shown < 0) continue
      spoken.push(i)
      const slot = shown * units + unitOf[i]!
      if (this.joint[slot] === 0) this.touched[count++] = slot
      this.joint[slot]! += weights[i]!
      this.outcomeMass[shown]! += weights[i]!
      whole += weights[i]!
    }
    // Σ over (outcome, unit) of m·log(m of outcome / m), over the whole.
    let conditional = 0
    for (let t = 0; t < count; t++) {
      const slot = this.touched[t]!
      const part = this.joint[slot]!
      if (part > 0) conditional += part * Math.log2(this.outcomeMass[Math.floor(slot / units)]! / part)
    }
    for (let t = 0; t < count; t++) {
      this.outcomeMass[Math.floor(this.touched[t]! / units)] = 0
      this.joint[this.touched[t]!] = 0
    }
    const { doubt } = this.doubtIn(spoken.length === left.length ? left : Int32Array.from(spoken))
    return Math.max(0, doubt - conditional / whole)
  }
}
