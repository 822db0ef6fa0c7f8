import { z } from 'zod'
import { checkCircuit, type Problem } from '../document/check-circuit'
import { circuitSchema, type Circuit } from '../document/circuit-schema'
import { problemsOf, type Opened } from '../document/open-circuit'
import { readingSchema, type Reading } from '../document/reading-schema'
import { refuseReading } from '../solver/legal-reading'
import { checkOdds, oddsSchema } from './odds-schema'
import { tooLarge } from './size-limit'
import { checkSymptoms, symptomsSchema } from './symptom-schema'

export const priorKinds = ['trade', 'even'] as const
export type PriorKind = (typeof priorKinds)[number]

/** What the evaluator is asked: the circuit, what was read, which codes are set, and which odds to start from. */
export const evaluationRequestSchema = z.strictObject({
  circuit: circuitSchema,
  readings: z.array(readingSchema).max(200).default([]),
  codes: z
    .array(
      z.string().regex(/^[PCBU][0-3][0-9A-F]{3}(-[0-9A-F]{2})?$/, {
        error: (issue) => `code "${String(issue.input)}": expected a code such as B1042 or B1042-13`,
      }),
    )
    .max(100)
    .default([]),
  priors: z.enum(priorKinds).default('trade'),
  /** Over the trade's table, which it leaves as it is where absent; `even` asks neither. */
  odds: oddsSchema.optional(),
  /** What the driver tells of it. */
  symptoms: symptomsSchema.optional(),
})
export type EvaluationRequest = z.infer<typeof evaluationRequestSchema>

/** The one door for a request: shapes, references, and readings that cannot be taken. */
export function openEvaluationRequest(input: unknown): Opened<EvaluationRequest> {
  const parsed = evaluationRequestSchema.safeParse(input, { reportInput: true })
  if (!parsed.success) return { ok: false, problems: problemsOf(parsed.error) }
  const request = parsed.data
  const problems = checkCircuit(request.circuit).map((problem) => ({
    ...problem,
    path: problem.path ? `circuit.${problem.path}` : 'circuit',
  }))
  const size = problems.length === 0 ? tooLarge(request.circuit) : null
  if (size) problems.push(size)
  if (problems.length === 0) {
    problems.push(...checkReadings(request.circuit, request.readings))
    if (request.symptoms) problems.push(...checkSymptoms(request.circuit, request.symptoms))
    if (request.odds) problems.push(...checkOdds(request.circuit, request.odds))
  }
  return problems.length === 0 ? { ok: true, value: request } : { ok: false, problems }
}

/** Readings that name what is not there, repeat an id, or could not have been taken. */
export function checkReadings(circuit: Circuit, readings: readonly Reading[]): Problem[] {
  const taken = new Set<string>()
  return readings.flatMap((reading, index) => {
    const path = `readings.${index}`
    if (taken.has(reading.id))
      return [{ path: `${path}.id`, message: `reading "${reading.id}" is listed twice` }]
    taken.add(reading.id)
    const problem = refuseReading(circuit, reading)
    return problem ? [{ path: `${path}.${problem.path}`, message: problem.message }] : []
  })
}
