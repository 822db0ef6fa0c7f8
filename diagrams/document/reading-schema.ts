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
  /** The harness was moved while the meter was on; its figures then went from `low` to `high`. */
  moved: z.boolean().optional(),
  low: z.union([number, z.literal('OL')]).optional(),
  high: z.union([number, z.literal('OL')]).optional(),
}

const kinds = z.discriminatedUnion('kind', [
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

/** What was measured, in which condition. Volt, ohm and ampere. */
export const readingSchema = kinds.superRefine((reading, context) => {
  const report = (field: string, message: string) =>
    context.addIssue({ code: 'custom', path: [field], message })
  const { low, high } = reading
  if (!reading.moved) {
    for (const field of ['low', 'high'] as const)
      if (reading[field] !== undefined) report(field, `"${field}" goes with "moved": expected "moved": true`)
    return
  }
  if (reading.kind === 'works' || reading.kind === 'sees')
    return report('moved', `"moved" goes with figures: expected volts, ohms or amps, not ${reading.kind}`)
  for (const field of ['low', 'high'] as const) {
    const value = reading[field]
    if (value === undefined) report(field, `missing: what the meter showed while the harness was moved`)
    else if (value === 'OL' && reading.kind !== 'ohms') report(field, `OL: expected a number`)
    else if (typeof value === 'number' && value < 0 && reading.kind === 'ohms')
      report(field, 'ohms below zero: expected 0 or more, or OL')
  }
  if (low === undefined || high === undefined) return
  if (figureOf(low) > figureOf(high))
    report('low', `low ${low} is above high ${high}: expected the lower one`)
  else if (figureOf(reading.value) < figureOf(low) || figureOf(reading.value) > figureOf(high))
    report('value', `${reading.value}: expected a value between low ${low} and high ${high}`)
})
export type Reading = z.infer<typeof readingSchema>

/** OL is above every figure. */
export function figureOf(value: number | 'OL'): number {
  return value === 'OL' ? Infinity : value
}
export type ReadingKind = Reading['kind']

/** A reading not yet taken: what to measure, without its value. */
export type Probe =
  | { kind: 'volts' | 'ohms'; red: string; black: string; condition: z.infer<typeof conditionSchema> }
  | { kind: 'amps'; wire: string; condition: z.infer<typeof conditionSchema> }
  | { kind: 'works'; node: string; condition: z.infer<typeof conditionSchema> }
  | { kind: 'sees'; pin: string; condition: z.infer<typeof conditionSchema> }

/** What a meter or an eye reports: a figure, out of range, a load's doing, an input's level. */
export type ReadingValue = number | 'OL' | boolean | 'high' | 'low'
