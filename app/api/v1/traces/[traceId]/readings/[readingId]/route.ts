import { route } from '@/lib/server/http/route'
import { putReading } from '@/lib/server/use-cases/traces/put-reading'
import { removeReading } from '@/lib/server/use-cases/traces/remove-reading'

const idsOf = ({ traceId = '', readingId = '' }: Record<string, string>) => ({ id: traceId, readingId })

export const PUT = route({
  body: true,
  use: (context, { params, body }) => putReading(context, idsOf(params), body),
})

export const DELETE = route({ use: (context, { params }) => removeReading(context, idsOf(params)) })
