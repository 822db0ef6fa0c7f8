import { z } from 'zod'
import { controlsSettingSchema } from './circuit-schema'
import { idSchema, pointSchema, positiveSchema } from './names'

/** The state of the vehicle while a reading is taken. Controls not named are at rest. */
export const conditionSchema = z.strictObject({
  controls: controlsSettingSchema.default({}),
  /** Connectors opened, fuses and relays pulled. */
  unplugged: z.array(idSchema).max(500).default([]),
  battery: z.boolean().default(true),
  charging: z.boolean().default(false),
  /** Leads and stand-in loads put in for the reading. */
  added: z
    .array(z.strictObject({ from: pointSchema, to: pointSchema, ohms: positiveSchema }))
    .max(20)
    .default([]),
})
export type Condition = z.infer<typeof conditionSchema>

export const restCondition: Condition = {
  controls: {},
  unplugged: [],
  battery: true,
  charging: false,
  added: [],
}
