import type { Circuit } from '../document/circuit-schema'
import type { Reading } from '../document/reading-schema'
import type { ReadingAnswer } from './answer'
import { isMoved, swings, type MovedReading } from './moved-reading'
import { readingPlace } from './reading-sentence'
import type { ReadingScope } from './reading-scope'
import { valueWords } from './value-words'

/** Readings with a sentence for those during which the harness was moved. */
export function sayMoved(
  circuit: Circuit,
  readings: readonly Reading[],
  judged: readonly ReadingAnswer[],
  scope: ReadingScope,
): ReadingAnswer[] {
  return judged.map((answer, r) => {
    const reading = readings[r]!
    if (!isMoved(reading)) return answer
    if (!swings(reading, scope))
      return { ...answer, says: `${answer.says} It stayed so while the harness was moved.` }
    const good =
      answer.expected === null ? '' : ` A good circuit stays at ${valueWords(reading.kind, answer.expected)}.`
    return { ...answer, says: `${readingPlace(circuit, reading)}: ${swingWords(reading)}.${good}` }
  })
}

/** After the verdict of a fault that comes and goes: what swung, and what follows from it. */
export function comesAndGoesSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  scope: ReadingScope,
): string {
  const moving = readings.filter((reading) => swings(reading, scope)).filter(isMoved)
  const [first] = moving
  if (!first) return ''
  return `This fault comes and goes: ${readingPlace(circuit, first)} ${swingWords(first)}. Readings may have been taken with it or without it.`
}

function swingWords({ kind, low, high }: MovedReading): string {
  return `went from ${valueWords(kind, low)} to ${valueWords(kind, high)} while the harness was moved`
}
