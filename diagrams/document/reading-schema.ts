import { z } from 'zod'
import { conditionSchema, restCondition } from './condition-schema'
import { idSchema, pointSchema } from './names'

const condition = conditionSchema.default(restCondition)
const number = z.number().min(-1e9).max(1e9)
const common = {
  id: idSchema,
  condition,
  accuracy: z
    .strictObject({ percent: z.number().min(0).max(50), floor: z.number().min(0).max(1e6) })
    .optional(),
  moved: z.boolean().optional(),
  low: number.optional(),
  high: number.optional(),
}

/** What was measured, in which condition. Volt, ohm and ampere. */
export const readingSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('volts'),
    ...common,
    red: pointSchema,
    black: pointSchema,
    value: z.union([number, z.literal('OL')]),
  }),
  z.strictObject({
    kind: z.literal('ohms'),
    ...common,
    red: pointSchema,
    black: pointSchema,
    value: z.union([number.min(0, { error: 'ohms below zero: expected 0 or more, or OL' }), z.literal('OL')]),
  }),
  z.strictObject({ kind: z.literal('amps'), ...common, wire: idSchema, value: number }),
  z.strictObject({ kind: z.literal('works'), ...common, node: idSchema, value: z.boolean() }),
  z.strictObject({
    kind: z.literal('sees'),
    ...common,
    pin: pointSchema,
    value: z.enum(['high', 'low']),
  }),
])
export type Reading = z.infer<typeof readingSchema>
export type ReadingKind = Reading['kind']

/** A reading not yet taken: what to measure, without its value. */
export type Probe =
  | { kind: 'volts' | 'ohms'; red: string; black: string; condition: z.infer<typeof conditionSchema> }
  | { kind: 'amps'; wire: string; condition: z.infer<typeof conditionSchema> }
  | { kind: 'works'; node: string; condition: z.infer<typeof conditionSchema> }
  | { kind: 'sees'; pin: string; condition: z.infer<typeof conditionSchema> }

/** What a meter or an eye reports: a figure, out of range, a load's doing, an input's level. */
export type ReadingValue = number | 'OL' | boolean | 'high' | 'low'
