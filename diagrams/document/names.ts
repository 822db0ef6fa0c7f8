import { z } from 'zod'

/**
 * Ids of nodes, wires, connectors, controls, sequence steps, annotations and readings. All but `__proto__`, which is
 * lost as the key of a setting.
 */
export const idSchema = z.string().regex(/^(?!__proto__$)[A-Za-z0-9_-]{1,40}$/, {
  error: (issue) => `id "${String(issue.input)}": expected 1 to 40 letters, digits, "_" or "-"`,
})

/** Names of ports, module pins and switch contacts. */
export const portNameSchema = z.string().regex(/^[A-Za-z0-9+_-]{1,12}$/, {
  error: (issue) => `port "${String(issue.input)}": expected 1 to 12 letters, digits, "+", "_" or "-"`,
})

/** Free text that is shown as text, never as markup. */
export const textSchema = z.string().max(4000)
export const labelSchema = z.string().max(120)

/** Where a wire lands: `node.port`. Whether the port exists is checked by `checkCircuit`. */
export const endSchema = z.string().regex(/^[A-Za-z0-9_-]{1,40}\.[A-Za-z0-9+_-]{1,12}$/, {
  error: (issue) => `end "${String(issue.input)}": expected node.port`,
})

/** Where a lead goes: `chassis`, `node.port` or `node.port:part`. */
export const pointSchema = z.string().regex(/^(chassis|[A-Za-z0-9_-]{1,40}\.[A-Za-z0-9+_-]{1,12}(:part)?)$/, {
  error: (issue) => `point "${String(issue.input)}": expected chassis, node.port or node.port:part`,
})

/** When a contact is closed, a feed live or a driver on. */
export const whenSchema = z.union([
  z.literal('always'),
  z.literal('never'),
  z.strictObject({ control: idSchema, positions: z.array(labelSchema).min(1).max(20) }),
])
export type When = z.infer<typeof whenSchema>

/** Of ohms, metres and mm²: below any real one, a conductance would no longer be a figure. */
export const positiveSchema = z.number().positive().min(1e-9).max(1e12)

/** A place on the drawing, pixels. Bounded, so that distances and sums of them stay figures. */
export const coordinateSchema = z.number().min(-100_000).max(100_000)
