import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf, type FaultModel } from '@/diagrams/faults/fault-model'
import { posteriorOf, siteProbabilities, type Posterior } from '@/diagrams/faults/posterior'
import { minutesFor, workplaceAfter } from '@/diagrams/planner/cost'
import { planNext } from '@/diagrams/planner/plan-next'
import type { Policy } from '@/diagrams/planner/policies/policy'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { takeReading } from './take-reading'

export interface PolicyRun {
  /** One place, or one group that cannot be told apart, holds 0.95; or nothing is wrong. */
  ended: boolean
  /** Whether what it ended with holds the true place. */
  right: boolean
  readings: Reading[]
  minutes: number
  /** Doubt over places that the readings took away, bits. */
  bitsRemoved: number
}

const locatedFrom = 0.95
/** No group that cannot be told apart is larger than this in practice. */
const largestGroup = 8

/**
 * Takes the readings a policy asks for until the place is found, by the evaluator's own rule, or `most` are
 * taken. Null where the vehicle does not come to rest in a condition asked for: nothing can be read there.
 */
export function traceByPolicy(
  circuit: Circuit,
  vehicle: Circuit,
  fault: PlantedFault,
  policy: Policy,
  random: () => number,
  most: number,
): PolicyRun | null {
  const model = faultModelOf(circuit)
  const readings: Reading[] = []
  let minutes = 0
  let before = Number.NaN
  for (;;) {
    const posterior = posteriorOf(model, weighReadings(model, readings), 'trade')
    const doubt = doubtOver(model, posterior)
    if (Number.isNaN(before)) before = doubt
    const found = foundGroup(model, posterior, readings)
    const run = (ended: boolean): PolicyRun => ({
      ended,
      right: found !== null && (found.includes(fault.site) || found.includes(`wire:${fault.other}`)),
      readings,
      minutes,
      bitsRemoved: before - doubt,
    })
    if (found) return run(true)
    if (readings.length >= most) return run(false)
    const probe = policy({ model, posterior, readings })
    if (!probe) return run(false)
    const reading = takeReading(`r${readings.length + 1}`, vehicle, probe, fault, random)
    if (!reading) return null
    minutes += minutesFor(circuit, probe, workplaceAfter(circuit, readings))
    readings.push(reading)
  }
}

/** Entropy over places and "no fault", bits. */
export function doubtOver(model: FaultModel, posterior: Posterior): number {
  let bits = 0
  for (const p of [posterior.noFault, ...siteProbabilities(model, posterior).values()])
    if (p > 0) bits -= p * Math.log2(p)
  return bits
}

function foundGroup(model: FaultModel, posterior: Posterior, readings: readonly Reading[]): string[] | null {
  if (posterior.noFault >= locatedFrom) return []
  const probabilities = [...siteProbabilities(model, posterior)].toSorted((a, b) => b[1] - a[1])
  const [first] = probabilities
  if (first && first[1] >= locatedFrom) return [first[0]]
  const top = probabilities.slice(0, largestGroup).reduce((sum, [, p]) => sum + p, 0)
  if (top < locatedFrom) return null
  const weight = new Map(probabilities)
  return (
    planNext(model, posterior, readings).inseparable.find(
      (group) => group.reduce((sum, site) => sum + (weight.get(site) ?? 0), 0) >= locatedFrom,
    ) ?? null
  )
}
