import { circuitJsonSchema } from '@/diagrams/document/json-schema'
import { openRoute } from '@/lib/server/http/route'
import { succeed } from '@/lib/shared/result'

export const GET = openRoute({
  use: async () => succeed(circuitJsonSchema()),
  respond: (schema) => Response.json(schema, { headers: { 'content-type': 'application/schema+json' } }),
})
