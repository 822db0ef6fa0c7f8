import { z } from 'zod'
import {
  coordinateSchema,
  idSchema,
  labelSchema,
  portNameSchema,
  positiveSchema,
  textSchema,
  whenSchema,
} from './names'
import { modulePinSchema } from './pin-circuit-schema'

const coordinate = coordinateSchema.default(0)

const common = {
  id: idSchema,
  label: labelSchema.default(''),
  x: coordinate,
  y: coordinate,
  connector: idSchema.optional(),
  cavities: z.record(portNameSchema, z.int().min(1).max(999)).optional(),
  notes: textSchema.default(''),
  accessMinutes: z.number().min(0).max(10_000).optional(),
}
const volts = z.number().min(0).max(1000)

export const loadStyles = ['lamp', 'motor', 'solenoid', 'heater', 'horn', 'other'] as const
export type LoadStyle = (typeof loadStyles)[number]

const switchContactSchema = z.strictObject({
  id: portNameSchema,
  a: portNameSchema,
  b: portNameSchema,
  closed: whenSchema.default('always'),
})
export type SwitchContact = z.infer<typeof switchContactSchema>

/** One part of the drawing. Ohm, volt and ampere; x and y in drawing pixels. */
export const nodeSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('battery'),
    ...common,
    volts: volts.default(12.6),
    ohms: positiveSchema.default(0.02),
  }),
  z.strictObject({
    kind: z.literal('feed'),
    ...common,
    volts: volts.default(12.6),
    ohms: positiveSchema.default(0.05),
    live: whenSchema.default('always'),
  }),
  z.strictObject({ kind: z.literal('ground'), ...common, ohms: positiveSchema.default(0.002) }),
  z.strictObject({
    kind: z.literal('fuse'),
    ...common,
    amps: z.number().positive().min(1e-6).max(2000),
    style: z.enum(['blade', 'link']).default('blade'),
  }),
  z.strictObject({
    kind: z.literal('switch'),
    ...common,
    contacts: z.array(switchContactSchema).min(1).max(100),
  }),
  z.strictObject({
    kind: z.literal('relay'),
    ...common,
    coilOhms: positiveSchema.default(85),
    pullIn: z.number().positive().max(1000).default(7.5),
    suppression: z.enum(['none', 'resistor', 'diode']).default('none'),
  }),
  z.strictObject({
    kind: z.literal('load'),
    ...common,
    ohms: positiveSchema,
    coldOhms: positiveSchema.optional(),
    style: z.enum(loadStyles).default('other'),
    worksFrom: z.number().min(0).max(1.2).default(0.7),
  }),
  z.strictObject({ kind: z.literal('resistor'), ...common, ohms: positiveSchema }),
  z.strictObject({
    kind: z.literal('diode'),
    ...common,
    volts: z.number().min(0).max(100).default(0.7),
  }),
  z.strictObject({ kind: z.literal('splice'), ...common }),
  z.strictObject({
    kind: z.literal('cavity'),
    ...common,
    connector: idSchema,
    number: z.int().min(1).max(999),
  }),
  z.strictObject({
    kind: z.literal('module'),
    ...common,
    pins: z.array(modulePinSchema).min(1).max(500),
    runsFrom: volts.default(6),
  }),
  z.strictObject({ kind: z.literal('dlc'), ...common }),
])
export type Node = z.infer<typeof nodeSchema>
export type NodeKind = Node['kind']
export type NodeOf<K extends NodeKind> = Extract<Node, { kind: K }>
