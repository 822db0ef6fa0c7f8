/** Seeded chance for tests: the same seed gives the same run on every machine (mulberry32). */
export interface Random {
  /** 0 ≤ x < 1 */
  next(): number
  /** Whole number, low ≤ x ≤ high. */
  whole(low: number, high: number): number
  chance(probability: number): boolean
  pick<T>(list: readonly T[]): T
  /** Evenly spread on a logarithmic scale. */
  logUniform(low: number, high: number): number
}

export function seededRandom(seed: number): Random {
  let state = seed >>> 0
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let t = Math.imul(state ^ (state >>> 15), state | 1)
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
  const whole = (low: number, high: number) => low + Math.floor(next() * (high - low + 1))
  return {
    next,
    whole,
    chance: (probability) => next() < probability,
    pick: (list) => list[whole(0, list.length - 1)]!,
    logUniform: (low, high) => low * (high / low) ** next(),
  }
}
