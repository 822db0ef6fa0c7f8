import { fileNameOf } from '@/lib/server/http/file-name'
import { route } from '@/lib/server/http/route'
import { getCircuit } from '@/lib/server/use-cases/circuits/get-circuit'

/** The document as a file, which imports again as it is. */
export const GET = route({
  use: (context, { params }) => getCircuit(context, { id: params.circuitId ?? '' }),
  respond: ({ document }) =>
    new Response(`${JSON.stringify(document, null, 2)}\n`, {
      headers: {
        'content-type': 'application/json; charset=utf-8',
        'content-disposition': `attachment; filename="${fileNameOf(document.title)}.halfsplit.json"`,
        'cache-control': 'no-store',
      },
    }),
})
