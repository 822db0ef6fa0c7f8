import type { z } from 'zod'
import type { circuitSchema, connectorSchema } from '../document/circuit-schema'

/** A circuit as a file holds it: defaults may be left out. */
export type SampleDocument = z.input<typeof circuitSchema>
export type SampleConnector = z.input<typeof connectorSchema>
