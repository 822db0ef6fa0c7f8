import { z } from 'zod'
import {
  coordinateSchema,
  endSchema,
  idSchema,
  labelSchema,
  pointSchema,
  positiveSchema,
  textSchema,
} from './names'
import { nodeSchema } from './node-schema'

export const cautions = ['high-voltage', 'airbag', 'fuel', 'moving-parts', 'hot-surface'] as const
export type Caution = (typeof cautions)[number]

export const codeEntrySchema = z.strictObject({
  code: z.string().regex(/^[PCBU][0-3][0-9A-F]{3}$/, {
    error: (issue) => `code "${String(issue.input)}": expected a code such as B1042`,
  }),
  failureType: z
    .string()
    .regex(/^[0-9A-F]{2}$/, {
      error: (issue) => `failure type "${String(issue.input)}": expected two hexadecimal digits`,
    })
    .optional(),
  text: textSchema.default(''),
  setWhen: textSchema.default(''),
  firstChecks: textSchema.default(''),
  sites: z.array(z.string().max(120)).max(1000).default([]),
})
export type CodeEntry = z.infer<typeof codeEntrySchema>

export const controlsSettingSchema = z.record(idSchema, labelSchema)
export type ControlsSetting = z.infer<typeof controlsSettingSchema>

export const controlSchema = z.strictObject({
  id: idSchema,
  label: labelSchema.default(''),
  positions: z.array(labelSchema.min(1)).min(1).max(20),
  rest: labelSchema,
})
export type Control = z.infer<typeof controlSchema>

export const connectorSchema = z.strictObject({
  id: idSchema,
  label: labelSchema.default(''),
  /** Null: the number of cavities is not stated, so any cavity number is taken. */
  cavities: z.int().min(1).max(999).nullable().default(null),
  rows: z.int().min(1).max(20).default(1),
  numbering: z.enum(['rows', 'snake', 'columns']).default('rows'),
  sides: z.strictObject({ a: labelSchema.default(''), b: labelSchema.default('') }).default({ a: '', b: '' }),
  location: textSchema.default(''),
  accessMinutes: z.number().min(0).max(10_000).default(2),
})
export type Connector = z.infer<typeof connectorSchema>

export const wireSchema = z.strictObject({
  id: idSchema,
  from: endSchema,
  to: endSchema,
  colour: z.string().max(20).default(''),
  signal: labelSchema.default(''),
  mm2: positiveSchema.default(0.75),
  /** Metres. */
  length: positiveSchema.default(1),
  /** Given resistance in ohm; null: computed from size and length. */
  ohms: positiveSchema.nullable().default(null),
  bends: z
    .array(z.strictObject({ x: coordinateSchema, y: coordinateSchema }))
    .max(200)
    .default([]),
})
export type Wire = z.infer<typeof wireSchema>

export const annotationSchema = z.strictObject({
  id: idSchema,
  kind: z.enum(['note', 'callout', 'expect']).default('note'),
  text: textSchema.default(''),
  x: coordinateSchema.default(0),
  y: coordinateSchema.default(0),
  point: pointSchema.optional(),
  controls: controlsSettingSchema.optional(),
})

/**
 * The circuit document, version 1: shape and defaults only. What refers to what is
 * checked by `checkCircuit`; come in through `openCircuit`, which does both.
 */
export const circuitSchema = z.strictObject({
  format: z.literal('halfsplit-circuit'),
  version: z.literal(1),
  title: labelSchema.min(1),
  vehicle: labelSchema.default(''),
  system: labelSchema.default(''),
  operation: textSchema.default(''),
  cautions: z.array(z.enum(cautions)).max(10).default([]),
  codes: z.array(codeEntrySchema).max(200).default([]),
  sequence: z
    .array(
      z.strictObject({
        id: idSchema,
        controls: controlsSettingSchema.default({}),
        text: textSchema.default(''),
      }),
    )
    .max(200)
    .default([]),
  controls: z.array(controlSchema).max(50).default([]),
  connectors: z.array(connectorSchema).max(500).default([]),
  nodes: z.array(nodeSchema).max(5000),
  wires: z.array(wireSchema).max(10_000),
  annotations: z.array(annotationSchema).max(500).default([]),
})
export type Circuit = z.infer<typeof circuitSchema>
