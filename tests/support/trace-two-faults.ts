import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe, Reading, ReadingValue } from '@/diagrams/document/reading-schema'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { measureTwoFaults, type TwoFaults } from '@/diagrams/solver/two-fault-case'
import { probeOf } from './trace-fault'

/** Limits of the format's page: percent of the value and a floor. */
const limits = { volts: [0.005, 0.02], ohms: [0.005, 0.2], amps: [0.02, 0.05] } as const

/** A reading of a vehicle with two faults, its error anywhere within the meter's limits; null when it cannot be taken. */
export function readTwoFaults(
  id: string,
  vehicle: Circuit,
  probe: Probe,
  faults: TwoFaults,
  random: () => number = () => 0.5,
): Reading | null {
  if (refuseReading(vehicle, probe)) return null
  const value = measureTwoFaults(vehicle, probe, faults)
  return value === null
    ? null
    : readingSchema.parse({ id, ...probe, value: shown(probe.kind, value, random) })
}

function shown(kind: Probe['kind'], value: ReadingValue, random: () => number): ReadingValue {
  if (typeof value !== 'number' || kind === 'works' || kind === 'sees') return value
  const [part, floor] = limits[kind]
  const off = value + (2 * random() - 1) * (part * Math.abs(value) + floor)
  return kind === 'ohms' ? Math.max(0, off) : off
}

/**
 * Takes the readings the planner asks for on a vehicle with two faults; a reading that is said to fit nothing
 * is taken again once. Ends when a pair holds 0.95, when nothing more is asked for, or after `most` readings.
 */
export function traceTwoFaults(
  circuit: Circuit,
  vehicle: Circuit,
  faults: TwoFaults,
  random: () => number,
  most: number,
): { answer: Answer; readings: Reading[] } {
  const readings: Reading[] = []
  const again = new Set<string>()
  for (;;) {
    const answer = evaluate({ circuit, readings, codes: [], priors: 'trade' })
    if (readings.length >= most || (answer.pairs?.[0]?.probability ?? 0) > 0.95) return { answer, readings }
    const doubted = readings.find((reading) => reading.id === answer.reading)
    let probe: Probe | undefined
    if (doubted && !again.has(doubted.id)) {
      again.add(doubted.id)
      const { id: _, value: __, ...same } = doubted
      probe = same as Probe
    } else if (answer.next[0]) probe = probeOf(answer.next[0])
    const id = `r${readings.length + 1}`
    const reading = probe && readTwoFaults(id, vehicle, probe, faults, random)
    if (!reading) return { answer, readings }
    if (doubted && again.has(doubted.id)) again.add(id)
    readings.push(reading)
  }
}

/** The places and those that look like them from outside. */
export function alikeOf(answer: Answer, site: string): string[] {
  return answer.inseparable.find((group) => group.includes(site)) ?? [site]
}
