import { z } from 'zod'
import { connectorSchema } from '@/diagrams/document/circuit-schema'

/** `GET /api/v1/connectors/:vehicleId/:connectorId/cavities/:n`: everything that cavity carries, over all circuits of the vehicle. */
export const cavityContentsSchema = z.object({
  vehicleId: z.string(),
  vehicle: z.string(),
  connector: connectorSchema,
  cavity: z.number(),
  carries: z.array(
    z.object({
      circuitId: z.string(),
      title: z.string(),
      /** `node.port` of the cavity in that circuit. */
      end: z.string(),
      part: z.string(),
      /** Null: the place is drawn, but no wire lands there. */
      wire: z
        .object({
          id: z.string(),
          colour: z.string(),
          mm2: z.number(),
          signal: z.string(),
          farEnd: z.string(),
        })
        .nullable(),
    }),
  ),
})
export type CavityContents = z.infer<typeof cavityContentsSchema>
