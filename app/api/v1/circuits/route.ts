import { route } from '@/lib/server/http/route'
import { createCircuit } from '@/lib/server/use-cases/circuits/create-circuit'
import { searchCircuits } from '@/lib/server/use-cases/circuits/search-circuits'

export const GET = route({ use: (context, { query }) => searchCircuits(context, query) })

export const POST = route({
  body: true,
  status: 201,
  use: (context, { body }) => createCircuit(context, body),
})
