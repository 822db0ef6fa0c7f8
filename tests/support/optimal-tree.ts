/**
 * Exact optimum of small instances: suspects with odds, tests with one certain outcome for each suspect.
 * Dynamic programming over sets of suspects as bits of a number, each set solved once: O(2ⁿ·tests) for n suspects.
 */
export interface SmallInstance {
  /** Odds of each suspect; they need not sum to 1. */
  weights: readonly number[]
  /** `outcomes[t][s]`: what test t shows when suspect s is at fault. */
  outcomes: readonly (readonly number[])[]
  /** Cost of each test; 1 each when left out. */
  costs?: readonly number[]
}

const mostSuspects = 12

/** Least expected cost to tell all suspects apart that can be told apart. */
export function optimalCost(instance: SmallInstance): number {
  const { weights, costs = instance.outcomes.map(() => 1) } = instance
  if (weights.length > mostSuspects)
    throw new Error(`${weights.length} suspects, expected at most ${mostSuspects}`)
  const known = new Map<number, number>()
  /** Expected cost times the weight of the set. */
  const solve = (set: number): number => {
    const kept = known.get(set)
    if (kept !== undefined) return kept
    let best = Infinity
    const weight = weightOf(weights, set)
    instance.outcomes.forEach((outcome, t) => {
      const parts = partsOf(outcome, set)
      if (parts.length < 2) return
      let cost = costs[t]! * weight
      for (const part of parts) {
        cost += solve(part)
        if (cost >= best) return
      }
      best = cost
    })
    // No test parts them: one suspect, or a group that looks alike.
    const found = best === Infinity ? 0 : best
    known.set(set, found)
    return found
  }
  const all = 2 ** weights.length - 1
  return solve(all) / weightOf(weights, all)
}

/** Chooses the next test for a set of suspects; null when it has none left. */
export type Chooser = (suspects: readonly number[], instance: SmallInstance) => number | null

/** Expected cost of a way of choosing, on the same instance. */
export function costOf(instance: SmallInstance, choose: Chooser): number {
  const { weights, costs = instance.outcomes.map(() => 1) } = instance
  const follow = (set: number): number => {
    const test = choose(membersOf(set), instance)
    if (test === null) return 0
    const parts = partsOf(instance.outcomes[test]!, set)
    if (parts.length < 2) throw new Error(`test ${test} tells none of its suspects apart`)
    return parts.reduce((sum, part) => sum + follow(part), costs[test]! * weightOf(weights, set))
  }
  const all = 2 ** weights.length - 1
  return follow(all) / weightOf(weights, all)
}

/** One step of look-ahead: most bits for the cost. */
export const greedy: Chooser = (suspects, { weights, outcomes, costs = outcomes.map(() => 1) }) => {
  const whole = suspects.reduce((sum, s) => sum + weights[s]!, 0)
  let best: number | null = null
  let bestRate = 1e-12
  outcomes.forEach((outcome, t) => {
    const byOutcome = new Map<number, number>()
    for (const s of suspects) byOutcome.set(outcome[s]!, (byOutcome.get(outcome[s]!) ?? 0) + weights[s]!)
    // Outcomes are certain, so the bits of a test are the entropy of its outcome.
    let bits = 0
    for (const mass of byOutcome.values()) bits -= (mass / whole) * Math.log2(mass / whole)
    if (byOutcome.size > 1 && bits / costs[t]! > bestRate) {
      bestRate = bits / costs[t]!
      best = t
    }
  })
  return best
}

function membersOf(set: number): number[] {
  const members: number[] = []
  for (let s = 0; 2 ** s <= set; s++) if (set & (1 << s)) members.push(s)
  return members
}

function weightOf(weights: readonly number[], set: number): number {
  return membersOf(set).reduce((sum, s) => sum + weights[s]!, 0)
}

function partsOf(outcome: readonly number[], set: number): number[] {
  const parts = new Map<number, number>()
  for (const s of membersOf(set)) parts.set(outcome[s]!, (parts.get(outcome[s]!) ?? 0) | (1 << s))
  return [...parts.values()]
}
