import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

export interface Step {
  reading: Extract<Reading, { kind: 'volts' }>
  /** What this and the readings before it left. */
  answer: Answer
}

/** Volts to chassis at one point after the other with the fault in: the values are the solver's, the rest the evaluator's. */
export function splitAlong(
  circuit: Circuit,
  fault: PlantedFault,
  controls: Record<string, string>,
  points: readonly string[],
): Step[] {
  const steps: Step[] = []
  for (const red of points) {
    const probe = {
      kind: 'volts' as const,
      red,
      black: 'chassis',
      condition: { ...restCondition, controls },
    }
    const measured = measure(circuit, probe, fault)
    if (!measured.ok || typeof measured.value !== 'number') return steps
    const reading = {
      ...probe,
      id: `r${steps.length + 1}`,
      // As a meter of two decimals shows it.
      value: Math.round(measured.value * 100) / 100,
    }
    const readings = [...steps.map((step) => step.reading), reading]
    steps.push({ reading, answer: evaluate({ circuit, readings, codes: [], priors: 'trade' }) })
  }
  return steps
}
