import { route } from '@/lib/server/http/route'
import { listTraces } from '@/lib/server/use-cases/traces/list-traces'
import { startTrace } from '@/lib/server/use-cases/traces/start-trace'

export const GET = route({ use: (context, { query }) => listTraces(context, query) })

export const POST = route({ body: true, status: 201, use: (context, { body }) => startTrace(context, body) })
