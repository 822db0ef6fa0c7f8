import { route } from '@/lib/server/http/route'
import { putProof } from '@/lib/server/use-cases/traces/put-proof'

export const PUT = route({
  body: true,
  use: (context, { params, body }) => putProof(context, { id: params.traceId ?? '' }, body),
})
