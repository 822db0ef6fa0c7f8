import type { Circuit } from './document/circuit-schema'
import type { NextReading } from './faults/answer'
import { outcomesOf } from './planner/outcomes'
import type { Plan } from './planner/plan-next'
import { nextWords } from './planner/wording'

/** What a plan offers, with what each outcome would leave, in words. */
export function nextReadings(circuit: Circuit, plan: Plan): NextReading[] {
  return plan.next.map((planned) => {
    const outcomes = outcomesOf(planned, plan.particles)
    return {
      ...planned.probe,
      bits: planned.bits,
      minutes: planned.minutes,
      outcomes,
      says: nextWords(circuit, planned.probe, planned.minutes, outcomes),
    }
  })
}
