import { fileNameOf } from '@/lib/server/http/file-name'
import { route } from '@/lib/server/http/route'
import { openFaultTable } from '@/lib/server/use-cases/circuits/open-fault-table'

const types = { csv: 'text/csv; charset=utf-8', ndjson: 'application/x-ndjson' } as const

/** Every fault at every point in every condition; `?format=ndjson` for a program. */
export const GET = route({
  use: (context, { params, query }) =>
    openFaultTable(context, { id: params.circuitId ?? '', format: query.format }),
  respond: ({ title, format, bytes }) =>
    new Response(bytes, {
      headers: {
        'content-type': types[format],
        'content-disposition': `attachment; filename="${fileNameOf(title)}.faults.${format}"`,
        'cache-control': 'no-store',
      },
    }),
})
