import type { ReadingValue } from '@/diagrams/document/reading-schema'
import type { NextOutcome } from '@/diagrams/faults/answer'

/** Which outcome of the next split a value falls in; null when it falls in none. */
export function outcomeOf(outcomes: readonly NextOutcome[], value: ReadingValue | null): NextOutcome | null {
  if (value === null) return null
  if (typeof value === 'number')
    return (
      outcomes.find(
        ({ low, high }) =>
          (low !== undefined || high !== undefined) &&
          value >= (low ?? Number.NEGATIVE_INFINITY) &&
          value <= (high ?? Number.POSITIVE_INFINITY),
      ) ?? null
    )
  const about = value === true ? 'works' : value === false ? 'does not' : value
  return outcomes.find((outcome) => outcome.about === about) ?? null
}
