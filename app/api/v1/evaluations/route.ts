import { route } from '@/lib/server/http/route'
import { evaluateRequest } from '@/lib/server/use-cases/evaluations/evaluate-request'

export const POST = route({
  body: true,
  use: (context, { body, signal }) => evaluateRequest(context, body, { signal }),
})
