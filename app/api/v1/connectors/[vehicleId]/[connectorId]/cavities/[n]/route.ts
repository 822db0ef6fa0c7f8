import { route } from '@/lib/server/http/route'
import { getCavity } from '@/lib/server/use-cases/connectors/get-cavity'

export const GET = route({
  use: (context, { params: { vehicleId = '', connectorId = '', n = '' } }) =>
    getCavity(context, { vehicleId, connectorId, n }),
})
