import { route } from '@/lib/server/http/route'
import { putFinding } from '@/lib/server/use-cases/traces/put-finding'

export const PUT = route({
  body: true,
  use: (context, { params, body }) => putFinding(context, { id: params.traceId ?? '' }, body),
})
