import { route } from '@/lib/server/http/route'
import { getTrace } from '@/lib/server/use-cases/traces/get-trace'

export const GET = route({ use: (context, { params }) => getTrace(context, { id: params.traceId ?? '' }) })
