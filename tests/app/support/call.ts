import type { Person } from './shop'

type Handler = (request: Request, segment: { params: Promise<Record<string, string>> }) => Promise<Response>
type Module = Partial<Record<'GET' | 'POST' | 'PUT' | 'DELETE', Handler>>

/** Every address of the API with the file that serves it, as Next finds them. */
export const addresses: Record<string, () => Promise<Module>> = {
  'circuit-schema': () => import('@/app/api/v1/circuit-schema/route'),
  circuits: () => import('@/app/api/v1/circuits/route'),
  'circuits/[circuitId]': () => import('@/app/api/v1/circuits/[circuitId]/route'),
  'circuits/[circuitId]/document': () => import('@/app/api/v1/circuits/[circuitId]/document/route'),
  'circuits/[circuitId]/fault-table': () => import('@/app/api/v1/circuits/[circuitId]/fault-table/route'),
  'connectors/[vehicleId]/[connectorId]/cavities/[n]': () =>
    import('@/app/api/v1/connectors/[vehicleId]/[connectorId]/cavities/[n]/route'),
  evaluations: () => import('@/app/api/v1/evaluations/route'),
  traces: () => import('@/app/api/v1/traces/route'),
  'traces/[traceId]': () => import('@/app/api/v1/traces/[traceId]/route'),
  'traces/[traceId]/cautions': () => import('@/app/api/v1/traces/[traceId]/cautions/route'),
  'traces/[traceId]/finding': () => import('@/app/api/v1/traces/[traceId]/finding/route'),
  'traces/[traceId]/proof': () => import('@/app/api/v1/traces/[traceId]/proof/route'),
  'traces/[traceId]/readings/[readingId]': () =>
    import('@/app/api/v1/traces/[traceId]/readings/[readingId]/route'),
}

export interface Answer {
  status: number
  body: any
  headers: Headers
}

/** One request through the real route handler, headers and all; `raw` sends a body that is not JSON-encoded here. */
export async function call(
  who: Pick<Person, 'cookie'> | null,
  method: 'GET' | 'POST' | 'PUT' | 'DELETE',
  path: string,
  body?: unknown,
  { headers = {}, raw }: { headers?: Record<string, string>; raw?: BodyInit } = {},
): Promise<Answer> {
  const [plain = ''] = path.split('?')
  const found = match(plain)
  if (!found) throw new Error(`no route for ${plain}`)
  const handler = (await found.load())[method]
  if (!handler) throw new Error(`${plain} takes no ${method}`)
  const sends = raw ?? (body === undefined ? undefined : JSON.stringify(body))
  const request = new Request(`http://127.0.0.1:3210/api/v1/${path}`, {
    method,
    headers: {
      host: '127.0.0.1:3210',
      ...(sends === undefined ? {} : { 'content-type': 'application/json' }),
      ...(who ? { cookie: who.cookie } : {}),
      ...headers,
    },
    ...(sends === undefined ? {} : { body: sends, duplex: 'half' }),
  } as RequestInit)
  const response = await handler(request, { params: Promise.resolve(found.params) })
  const text = await response.text()
  const isJson = /[/+]json/.test(response.headers.get('content-type') ?? '')
  return {
    status: response.status,
    body: text === '' ? null : isJson ? JSON.parse(text) : text,
    headers: response.headers,
  }
}

function match(path: string) {
  const parts = path.split('/')
  for (const [address, load] of Object.entries(addresses)) {
    const pattern = address.split('/')
    if (pattern.length !== parts.length) continue
    const params: Record<string, string> = {}
    const fits = pattern.every((piece, index) => {
      const part = parts[index] ?? ''
      if (!piece.startsWith('[')) return piece === part
      params[piece.slice(1, -1)] = decodeURIComponent(part)
      return true
    })
    if (fits) return { load, params }
  }
  return null
}
