import type { Probe, Reading } from '../../document/reading-schema'
import type { FaultModel } from '../../faults/fault-model'
import { siteProbabilities, type Posterior } from '../../faults/posterior'

/** What is known when the next reading is chosen. */
export interface Known {
  model: FaultModel
  posterior: Posterior
  readings: readonly Reading[]
}

/** A way of choosing the next reading. Null when it has no reading left to ask for. */
export type Policy = (known: Known) => Probe | null

/** Below this a place is no longer counted as in question. */
const leastProbability = 0.003

/** Places a person would still count as in question, most probable first. */
export function suspectsLeft({ model, posterior }: Known): string[] {
  return [...siteProbabilities(model, posterior)]
    .filter(([, probability]) => probability >= leastProbability)
    .toSorted((a, b) => b[1] - a[1])
    .map(([site]) => site)
}
