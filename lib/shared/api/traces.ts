import { z } from 'zod'
import { circuitSchema } from '@/diagrams/document/circuit-schema'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { modes } from '@/diagrams/document/sites'
import { oddsSchema } from '@/diagrams/faults/odds-schema'
import { symptomsSchema } from '@/diagrams/faults/symptom-schema'

const uuid = (field: string) => z.uuid({ error: `${field}: expected a UUID` })
const text = (field: string, most: number) =>
  z
    .string({ error: `${field}: expected text` })
    .trim()
    .max(most, { error: `${field}: at most ${most} characters` })

/** A trouble code as taken down: `B1234` or `B1234-14`. */
export const traceCodeSchema = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[PCBU][0-3][0-9A-F]{3}(-[0-9A-F]{2})?$/, {
    error: (issue) => `code "${String(issue.input)}": expected a code such as B1042 or B1042-13`,
  })

export const traceStates = ['open', 'done'] as const

/** `POST /api/v1/traces`. The id comes from the client, so that a repeated request is harmless. */
export const startTraceSchema = z.strictObject({
  id: uuid('id'),
  circuitId: uuid('circuitId'),
  vehicle: text('vehicle', 120).default(''),
  complaint: text('complaint', 2000).default(''),
  codes: z.array(traceCodeSchema).max(20, { error: 'codes: at most 20' }).default([]),
  /** What the driver tells of loads and of the sequence. */
  symptoms: symptomsSchema.default([]),
})
export type StartTrace = z.input<typeof startTraceSchema>

/** `PUT /api/v1/traces/:id/readings/:readingId`: the reading itself, its `id` the same as in the address. */
export const putReadingSchema = readingSchema

/** `PUT /api/v1/traces/:id/finding`. Site and mode both null: nothing was found. */
export const putFindingSchema = z
  .strictObject({
    site: z.string().max(120).nullable(),
    mode: z.enum(modes, { error: 'mode: unknown way to fail' }).nullable(),
    note: text('note', 4000).default(''),
    repaired: z.boolean({ error: 'repaired: expected true or false' }),
  })
  .refine((finding) => (finding.site === null) === (finding.mode === null), {
    path: ['mode'],
    error: 'mode: give place and mode together, or neither',
  })
export type PutFinding = z.input<typeof putFindingSchema>

/** `PUT /api/v1/traces/:id/proof`: the confirming reading after the repair, and whether the circuit works now. */
export const putProofSchema = z.strictObject({
  reading: readingSchema,
  works: z.boolean({ error: 'works: expected true or false' }),
})
export type PutProof = z.input<typeof putProofSchema>

const finding = z.object({
  site: z.string().nullable(),
  mode: z.enum(modes).nullable(),
  note: z.string(),
  repaired: z.boolean(),
  at: z.string(),
})
const proof = z.object({ reading: readingSchema, works: z.boolean(), at: z.string() })

/** A whole trace, as GET and every write of it answer. */
export const traceSchema = z.object({
  id: z.string(),
  /** The edition of the circuit the trace was started on, whatever was saved since. */
  circuit: z.object({ id: z.string(), revision: z.number(), document: circuitSchema }),
  vehicle: z.string(),
  complaint: z.string(),
  codes: z.array(z.string()),
  symptoms: symptomsSchema,
  /** In the order they were taken. */
  readings: z.array(readingSchema),
  cautionsAnsweredAt: z.string().nullable(),
  finding: finding.nullable(),
  proof: proof.nullable(),
  /** What the organisation found so far, for the evaluator; null while there is nothing. */
  odds: oddsSchema.nullable().default(null),
  /** Done once a proof says that it works. */
  state: z.enum(traceStates),
  by: z.string(),
  mine: z.boolean(),
  startedAt: z.string(),
  updatedAt: z.string(),
})
export type Trace = z.infer<typeof traceSchema>

/** `GET /api/v1/traces?open=1` */
export const traceListQuerySchema = z.strictObject({
  open: z.enum(['0', '1'], { error: 'open: expected 0 or 1' }).optional(),
  circuitId: uuid('circuitId').optional(),
})
export type TraceListQuery = z.infer<typeof traceListQuerySchema>

export const traceRowSchema = z.object({
  id: z.string(),
  circuitId: z.string(),
  title: z.string(),
  vehicle: z.string(),
  complaint: z.string(),
  codes: z.array(z.string()),
  readings: z.number(),
  state: z.enum(traceStates),
  by: z.string(),
  updatedAt: z.string(),
  /** How far the evaluator got, for open traces; null when it has no answer. */
  progress: z
    .object({
      outcome: z.enum(['located', 'narrowed', 'no-fault', 'two-faults', 'cannot-be']),
      places: z.number(),
      /** Not yet proved good, faulty ones included. */
      left: z.number(),
      says: z.string(),
      next: z.string().nullable(),
    })
    .nullable(),
})
export type TraceRow = z.infer<typeof traceRowSchema>
export const traceListSchema = z.object({ rows: z.array(traceRowSchema) })
export type TraceList = z.infer<typeof traceListSchema>
