import { circuitJsonSchema } from '@/diagrams/document/json-schema'
import { route } from '@/lib/server/http/route'
import { succeed } from '@/lib/shared/result'

export const GET = route({
  open: true,
  use: async () => succeed(circuitJsonSchema()),
  respond: (schema) => Response.json(schema, { headers: { 'content-type': 'application/schema+json' } }),
})
