import { z } from 'zod'
import { labelSchema, portNameSchema, positiveSchema, whenSchema } from './names'

const volts = z.number().min(0).max(1000)
const on = whenSchema.default('always')

/** What stands behind one pin of a module. Ohm and volt; see the table in the format's page. */
export const pinCircuitSchema = z.discriminatedUnion('type', [
  z.strictObject({ type: z.literal('supply'), ohms: positiveSchema }),
  z.strictObject({ type: z.literal('ground') }),
  z.strictObject({ type: z.literal('pull-up'), volts, ohms: positiveSchema }),
  z.strictObject({ type: z.literal('pull-down'), ohms: positiveSchema }),
  z.strictObject({ type: z.literal('low-side'), on, onOhms: positiveSchema.default(0.1) }),
  z.strictObject({
    type: z.literal('high-side'),
    on,
    onOhms: positiveSchema.default(0.1),
    from: portNameSchema.optional(),
  }),
  z.strictObject({ type: z.literal('source'), volts, ohms: positiveSchema, on }),
  z.strictObject({ type: z.literal('bridge'), to: portNameSchema, ohms: positiveSchema }),
  z.strictObject({ type: z.literal('none') }),
])
export type PinCircuit = z.infer<typeof pinCircuitSchema>

export const modulePinSchema = z.strictObject({
  pin: portNameSchema,
  name: labelSchema.default(''),
  circuit: pinCircuitSchema.default({ type: 'none' }),
  cavity: z.int().min(1).max(999).optional(),
  connector: z.string().optional(),
  threshold: z.number().min(0).max(1000).optional(),
})
export type ModulePin = z.infer<typeof modulePinSchema>
