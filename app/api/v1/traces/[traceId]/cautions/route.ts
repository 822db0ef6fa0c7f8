import { route } from '@/lib/server/http/route'
import { answerCautions } from '@/lib/server/use-cases/traces/answer-cautions'

/** A body is neither needed nor read. */
export const PUT = route({
  use: (context, { params }) => answerCautions(context, { id: params.traceId ?? '' }),
})
