import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import {
  readingSchema,
  type Probe,
  type Reading,
  type ReadingValue,
} from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer, SiteAnswer } from '@/diagrams/faults/answer'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { inCondition } from './made-circuit'

type Change = Partial<Condition>

/**
 * A circuit with a fault planted in it and somebody with a meter before it. Every reading is what an exact
 * meter would show; it is noted down in order and handed to the evaluator, which knows nothing of the fault.
 */
export class ToldStory {
  readonly readings: Reading[] = []

  constructor(
    readonly circuit: Circuit,
    private fault?: PlantedFault,
  ) {}

  /** Volts of a point to the black lead. */
  volts(red: string, change: Change = {}, black = 'chassis'): number {
    return Number(this.note({ kind: 'volts', red, black, condition: inCondition(change) }))
  }

  /** Ohms with the battery off, unless the condition says otherwise. */
  ohms(red: string, black: string, change: Change = {}): number | 'OL' {
    const condition = inCondition({ battery: false, ...change })
    return this.note({ kind: 'ohms', red, black, condition }) as number | 'OL'
  }

  amps(wire: string, change: Change = {}): number {
    return Number(this.note({ kind: 'amps', wire, condition: inCondition(change) }))
  }

  works(node: string, change: Change = {}): boolean {
    return Boolean(this.note({ kind: 'works', node, condition: inCondition(change) }))
  }

  sees(pin: string, change: Change = {}): 'high' | 'low' {
    return this.note({ kind: 'sees', pin, condition: inCondition(change) }) as 'high' | 'low'
  }

  /** The fault is mended; later readings are those of a good circuit. */
  repair() {
    this.fault = undefined
  }

  private note(probe: Probe): ReadingValue {
    const measured = measure(this.circuit, probe, this.fault)
    if (!measured.ok) throw new Error(measured.problem.message)
    this.readings.push(
      readingSchema.parse({ id: `r${this.readings.length + 1}`, ...probe, value: measured.value }),
    )
    return measured.value
  }

  /** What the evaluator makes of the readings so far, through the door every request comes in by. */
  answer(codes: string[] = [], priors: 'trade' | 'even' = 'trade'): Answer {
    const opened = openEvaluationRequest({ circuit: this.circuit, readings: this.readings, codes, priors })
    if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
    return evaluate(opened.value)
  }
}

export const faultyOf = (answer: Answer): string[] =>
  answer.sites.filter((site) => site.verdict === 'faulty').map((site) => site.site)

export function siteOf(answer: Answer, id: string): SiteAnswer {
  const found = answer.sites.find((site) => site.site === id)
  if (!found) throw new Error(`no place ${id}`)
  return found
}

/** The last reading's own judgement. */
export const lastAgrees = (answer: Answer): boolean => answer.readings.at(-1)!.agrees

/** The places not proved good, likeliest first. */
export const leftOf = (answer: Answer): string[] =>
  answer.sites.filter((site) => site.verdict !== 'proved-good').map((site) => site.site)

/** Probability of these places together. */
export const shareOf = (answer: Answer, sites: readonly string[]): number =>
  answer.sites.reduce((sum, site) => sum + (sites.includes(site.site) ? site.probability : 0), 0)
