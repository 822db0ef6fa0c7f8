import { z } from 'zod'
import { circuitSchema } from '@/diagrams/document/circuit-schema'

const finder = z.string().trim().max(120).optional()

/** `GET /api/v1/circuits`: every finder that is given must fit. */
export const circuitSearchSchema = z.strictObject({
  /** Words (or their beginnings) of a title, vehicle, system, part or signal; all must be there. */
  name: finder,
  /** `B1234`, `B1234-14`, or the beginning of one. */
  code: finder,
  /** A connector's label, or its beginning. */
  connector: finder,
  cavity: z.coerce
    .number({ error: 'cavity: expected a whole number from 1 to 999' })
    .int({ error: 'cavity: expected a whole number from 1 to 999' })
    .min(1, { error: 'cavity: expected a whole number from 1 to 999' })
    .max(999, { error: 'cavity: expected a whole number from 1 to 999' })
    .optional(),
  /** `BU/WH`: that base and stripe. `BU`: that base, striped or not. `BU/`: that base without a stripe. */
  colour: finder,
  /** One system exactly, as in the counts. */
  system: finder,
  cursor: z.string().max(1000).optional(),
})
export type CircuitSearch = z.infer<typeof circuitSearchSchema>

/** One line of the result: a cavity (or a wire that meets no connector) when a place was asked for, else a circuit. */
export const circuitRowSchema = z.object({
  /** Unique within a result, for keys of lists. */
  key: z.string(),
  kind: z.enum(['circuit', 'cavity', 'wire']),
  circuitId: z.string(),
  title: z.string(),
  vehicle: z.string(),
  system: z.string(),
  /** `B1234-14`: the code asked for, else the circuit's first; null when it has none. */
  code: z.string().nullable(),
  /** The connector's label and number, with the ids to look it up; null in circuit and wire rows. */
  cavity: z
    .object({ vehicleId: z.string(), connectorId: z.string(), connector: z.string(), number: z.number() })
    .nullable(),
  /** Null in circuit rows. */
  wire: z.object({ id: z.string(), colour: z.string(), mm2: z.number() }).nullable(),
  /** The signal with its far ends: "SW5 to K3 86, coil feed". In circuit rows the text of the code. */
  carries: z.string(),
  updatedAt: z.string(),
})
export type CircuitRow = z.infer<typeof circuitRowSchema>

export const circuitPageSchema = z.object({
  rows: z.array(circuitRowSchema),
  nextCursor: z.string().nullable(),
  /** How many rows, and how many circuits they lie in, over all pages. */
  found: z.object({ rows: z.number(), circuits: z.number() }),
  /** All circuits of the organisation by system, for the thumb index; independent of the finders. */
  systems: z.array(z.object({ system: z.string(), circuits: z.number() })),
  circuits: z.number(),
})
export type CircuitPage = z.infer<typeof circuitPageSchema>

/** What to do when a connector of the document differs from the vehicle's: refuse with the difference, keep the vehicle's, or replace it. */
export const connectorChoices = ['refuse', 'keep', 'replace'] as const
export type ConnectorChoice = (typeof connectorChoices)[number]
const connectors = z
  .enum(connectorChoices, { error: 'connectors: expected refuse, keep or replace' })
  .default('refuse')

const document = z.custom<unknown>((value) => value !== undefined, {
  error: 'document: missing, expected a circuit document',
})

/** `POST /api/v1/circuits`. The document is opened by `openCircuit`; its problems come with paths under `document`. */
export const createCircuitSchema = z.strictObject({
  /** A client that may retry sends an id of its own: the same id again answers with the circuit already there. */
  id: z.uuid({ error: 'id: expected a UUID' }).optional(),
  document,
  connectors,
})
export type CreateCircuit = z.input<typeof createCircuitSchema>

/** `PUT /api/v1/circuits/:id`. A stale `baseRevision` answers 409 `stale-revision`. */
export const saveCircuitSchema = z.strictObject({
  baseRevision: z.int({ error: 'baseRevision: expected a whole number' }).min(1),
  document,
  connectors,
})
export type SaveCircuit = z.input<typeof saveCircuitSchema>

/** A stored circuit, as GET, POST and PUT answer it. */
export const storedCircuitSchema = z.object({
  id: z.string(),
  revision: z.number(),
  document: circuitSchema,
  vehicleId: z.string(),
  /** Whether the asking person made it. */
  mine: z.boolean(),
  /** What the asking person may do with it. */
  may: z.object({ edit: z.boolean(), delete: z.boolean() }),
  savedBy: z.string(),
  createdAt: z.string(),
  updatedAt: z.string(),
})
export type StoredCircuit = z.infer<typeof storedCircuitSchema>
