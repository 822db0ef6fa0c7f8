import type { Circuit } from '../document/circuit-schema'
import { conditionParts } from '../document/condition-words'
import type { Reading } from '../document/reading-schema'
import type { ReadingAnswer } from './answer'
import { highestVolts } from './highest-volts'
import { readingPlace } from './reading-sentence'
import { listWords, valueWords } from './value-words'

/** Which reading fits nothing, what may have gone wrong with it, and to take it again. */
export function misfitSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  judged: readonly ReadingAnswer[],
  id: string | undefined,
): string {
  const index = readings.findIndex((reading) => reading.id === id)
  const reading = readings[index]
  if (!reading) return 'These readings fit no single fault in this circuit.'
  const name = `R${index + 1}`
  const most = highestVolts(circuit, reading.condition.charging)
  const shown = `${readingPlace(circuit, reading)}, ${valueWords(reading.kind, reading.value)}`
  if (reading.kind === 'volts' && typeof reading.value === 'number' && Math.abs(reading.value) > most) {
    const meant = meantVolts(reading.value, most, judged[index]!)
    const ask =
      meant === null
        ? 'Check the leads and the range'
        : `Was it ${valueWords('volts', meant)}? If not, check the leads`
    return `${name} cannot be: ${shown} is above any source of this circuit, ${valueWords('volts', most)} at most. ${ask} and take it again.`
  }
  const meant = meantFigure(reading, judged[index]!)
  const was = meant === null ? '' : ` Was it ${valueWords(reading.kind, meant)}?`
  const state = conditionParts(circuit, reading.condition)
  const check =
    state.length > 0
      ? `Check the leads, and that it was taken with ${listWords(state)}`
      : 'Check the leads and the range'
  return `${name} fits no fault in this circuit: ${shown}.${was} ${check}, and take it again.`
}

const scales = [10, 100, 1000, 1e6]

/** The same digits on a lower scale that a source of this circuit can give, the good circuit's figure first. */
function meantVolts(value: number, most: number, judged: ReadingAnswer): number | null {
  const lower = scales.map((scale) => value / scale).filter((volts) => Math.abs(volts) <= most)
  return lower.find((volts) => isAbout(volts, judged)) ?? lower[0] ?? null
}

/** The same digits on another scale, or with the leads swapped, that the good circuit would show. */
function meantFigure({ value }: Reading, judged: ReadingAnswer): number | null {
  if (typeof value !== 'number' || judged.agrees) return null
  const others = [-value, ...scales.flatMap((scale) => [value * scale, value / scale])]
  return others.find((other) => isAbout(other, judged)) ?? null
}

function isAbout(value: number, { expected }: ReadingAnswer): boolean {
  return (
    typeof expected === 'number' &&
    Math.abs(expected) > 0.5 &&
    Math.abs(value - expected) < 0.06 * Math.abs(expected)
  )
}
