import type { NextOutcome } from '@/diagrams/faults/answer'

export interface RuleCut {
  /** Cells before it in path order. */
  after: number
  before: NextOutcome
  beyond: NextOutcome
}

/**
 * Where the next reading cuts the row of places left: every place before the cut under one outcome, every place beyond
 * it under another. Null when the outcomes are mixed along the path, or there are not two of them.
 */
export function ruleCut(left: readonly string[], outcomes: readonly NextOutcome[]): RuleCut | null {
  if (left.length < 2) return null
  const under = left.map((site) => outcomes.filter((outcome) => outcome.leaves.includes(site)))
  for (const before of outcomes)
    for (const beyond of outcomes) {
      if (before === beyond) continue
      const firstBeyond = under.findIndex((list) => !list.includes(before))
      if (firstBeyond <= 0) continue
      if (
        under.slice(firstBeyond).every((list) => list.includes(beyond) && !list.includes(before)) &&
        under.slice(0, firstBeyond).every((list) => !list.includes(beyond))
      )
        return { after: firstBeyond, before, beyond }
    }
  return null
}
