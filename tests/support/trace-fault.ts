import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer, NextReading } from '@/diagrams/faults/answer'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { takeReading } from './take-reading'

export interface TraceRun {
  answer: Answer
  readings: Reading[]
  minutes: number
}

/** Takes the readings the planner asks for until the evaluator has its answer, the planner has no more, or `most` are taken. */
export function traceFault(
  circuit: Circuit,
  vehicle: Circuit,
  fault: PlantedFault | undefined,
  random: () => number,
  most: number,
  codes: string[] = [],
  allow: (next: NextReading) => boolean = () => true,
): TraceRun {
  const readings: Reading[] = []
  let minutes = 0
  for (;;) {
    const answer = evaluate({ circuit, readings, codes, priors: 'trade' })
    if (answer.outcome !== 'narrowed' || readings.length >= most) return { answer, readings, minutes }
    const next = answer.next.find(allow)
    if (!next) return { answer, readings, minutes }
    const reading = takeReading(`r${readings.length + 1}`, vehicle, probeOf(next), fault, random)
    if (!reading)
      throw new Error(`the planner asked for a reading that cannot be taken: ${JSON.stringify(next)}`)
    minutes += next.minutes
    readings.push(reading)
  }
}

export function probeOf(next: NextReading): Probe {
  const { kind, red, black, wire, node, pin, condition } = next
  const leads = Object.entries({ red, black, wire, node, pin }).filter(([, lead]) => lead !== undefined)
  return { kind, ...Object.fromEntries(leads), condition } as Probe
}
