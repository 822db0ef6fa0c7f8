import { z } from 'zod'
import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import { idSchema } from '../document/names'

export const doings = ['not-work', 'always', 'weakly'] as const

/**
 * What the driver tells, before anything is measured: a load that does not work where it should, works also where it should
 * not, or works on part of its volts; or the step of the document's sequence at which it stops.
 */
export const symptomSchema = z.union([
  z.strictObject({ node: idSchema, does: z.enum(doings) }),
  z.strictObject({ step: idSchema }),
])
export type Symptom = z.infer<typeof symptomSchema>

export const symptomsSchema = z.array(symptomSchema).max(20)

/** Complaints about what the circuit does not have, or that cannot all be. */
export function checkSymptoms(circuit: Circuit, symptoms: readonly Symptom[]): Problem[] {
  let stopsAt: string | null = null
  return symptoms.flatMap((symptom, index): Problem[] => {
    const path = `symptoms.${index}`
    if ('node' in symptom) {
      const node = circuit.nodes.find((n) => n.id === symptom.node)
      if (node?.kind === 'load') return []
      return [
        {
          path: `${path}.node`,
          message: node
            ? `"${symptom.node}" is a ${node.kind}: expected a load`
            : `load "${symptom.node}" does not exist`,
        },
      ]
    }
    if (!circuit.sequence.some((step) => step.id === symptom.step))
      return [{ path: `${path}.step`, message: `step "${symptom.step}" does not exist` }]
    if (stopsAt !== null && stopsAt !== symptom.step)
      return [
        {
          path: `${path}.step`,
          message: `stops at step "${symptom.step}", and at step "${stopsAt}" before: expected one step`,
        },
      ]
    stopsAt = symptom.step
    return []
  })
}
