import type { ErrorBody } from '@/lib/shared/api/error-body'
import { errors } from '@/lib/shared/errors'
import type { Failure } from '@/lib/shared/result'

const headers = { 'cache-control': 'no-store' }

export function answerWith(value: unknown, status: number): Response {
  return status === 204 ? new Response(null, { status, headers }) : Response.json(value, { status, headers })
}

export function answerFailure({ code, message, path, details }: Failure): Response {
  const body: ErrorBody = {
    error: { code, message, ...(path ? { path } : {}), ...(details ? { details } : {}) },
  }
  const response = Response.json(body, { status: errors[code].status, headers })
  if (code === 'too-many-attempts') response.headers.set('retry-after', '900')
  return response
}
