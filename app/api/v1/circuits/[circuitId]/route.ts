import { route } from '@/lib/server/http/route'
import { deleteCircuit } from '@/lib/server/use-cases/circuits/delete-circuit'
import { getCircuit } from '@/lib/server/use-cases/circuits/get-circuit'
import { saveCircuit } from '@/lib/server/use-cases/circuits/save-circuit'

const idOf = (params: Record<string, string>) => ({ id: params.circuitId ?? '' })

export const GET = route({ use: (context, { params }) => getCircuit(context, idOf(params)) })

export const PUT = route({
  body: true,
  use: (context, { params, body }) => saveCircuit(context, idOf(params), body),
})

export const DELETE = route({
  status: 204,
  use: (context, { params }) => deleteCircuit(context, idOf(params)),
})
