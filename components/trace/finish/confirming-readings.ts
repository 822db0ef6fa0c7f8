import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe, Reading, ReadingValue } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import { readingNumber } from '@/lib/client/evaluator/numbered-readings'
import { conditionWords, measuredWords, valueWords } from '@/lib/client/meter/reading-words'

export interface ConfirmingReading {
  /** The reading that is taken again, "R4". */
  number: string
  probe: Probe
  /** What it must show once the fault is mended. */
  good: ReadingValue
  words: string
}

/**
 * Readings that can prove a repair, best first: those that did not agree with the good circuit, the newest of them
 * first, since they show the fault and must not show it any more; then the others.
 */
export function confirmingReadings(
  circuit: Circuit,
  readings: readonly Reading[],
  answer: Answer | null,
): ConfirmingReading[] {
  const told = new Map((answer?.readings ?? []).map((one) => [one.id, one]))
  const rows = readings.flatMap((reading, index) => {
    const number = readingNumber(index)
    const own = told.get(number)
    if (!own || own.expected === null) return []
    const { id: _, value: __, ...probe } = reading
    return [
      {
        agrees: own.agrees,
        number,
        probe: probe as Probe,
        good: own.expected,
        words: `${measuredWords(circuit, reading)}, ${conditionWords(circuit, reading.condition)}: ${valueWords(reading.kind, own.expected)}`,
      },
    ]
  })
  return rows
    .toReversed()
    .toSorted((one, other) => Number(one.agrees) - Number(other.agrees))
    .map(({ agrees: _, ...row }) => row)
}
