import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import { confirmingReadings as confirmRepair } from '@/diagrams/planner/confirming-readings'
import { sameProbe } from '@/lib/client/meter/same-probe'
import type { Trace } from '@/lib/shared/api/traces'
import { confirmingReadings, type ConfirmingReading } from './confirming-readings'

export interface ProofSteps {
  /** What proves the repair, in the order in which it is done. */
  steps: string[]
  /** Readings to record as the proof: those taken before, then those the steps ask for. */
  choices: ConfirmingReading[]
}

/** How the repair of what was found is proved; nothing to prove where nothing was found. */
export function proofSteps(
  circuit: Circuit,
  finding: Trace['finding'],
  readings: readonly Reading[],
  answer: Answer | null,
): ProofSteps {
  const taken = confirmingReadings(circuit, readings, answer)
  if (!finding?.site || !finding.mode) return { steps: [], choices: taken }
  const { site, mode } = finding
  const known = answer?.sites.find((one) => one.site === site)?.modes.find((one) => one.mode === mode)
  const found = confirmRepair(circuit, { site, mode, ohms: known?.ohms, other: known?.other }, readings)
  const asked = found.flatMap(({ probe, expected, says }, index): ConfirmingReading[] =>
    taken.some((one) => sameProbe(circuit, one.probe, probe))
      ? []
      : [{ number: `Step ${index + 1}`, probe, good: expected, words: says }],
  )
  return { steps: found.map(({ says }) => says), choices: [...taken, ...asked] }
}
