import { NextRequest } from 'next/server'
import { succeed } from '@/lib/shared/result'
import { answerFailure } from './answer'
import { attempt } from './attempt'

/** What a form to sign in with could ever hold, many times over. */
const mostBytes = 16 * 1024

type Handler = (request: Request) => Promise<Response>

/**
 * In front of next-auth, which reads a body to its end and answers one that it cannot read with 500: a body must be a
 * form or JSON, and short. It is read here and handed on whole.
 */
export async function guardSignIn(request: Request, handle: Handler): Promise<Response> {
  if (request.method !== 'POST') return settled(request, handle)
  const chunks: Uint8Array[] = []
  let bytes = 0
  const reader = request.body?.getReader()
  while (reader) {
    const { done, value } = await reader.read()
    if (done) break
    bytes += value.byteLength
    if (bytes > mostBytes) {
      await reader.cancel().catch(() => {})
      return refuse('too-large', 'The request is larger than 16 kB and was refused.')
    }
    chunks.push(value)
  }
  const body = Buffer.concat(chunks)
  const type = request.headers.get('content-type') ?? ''
  const isForm = /^application\/x-www-form-urlencoded\s*(;|$)/i.test(type)
  if (bytes > 0 && !isForm && !isJsonObject(type, body))
    return refuse('bad-request', 'The body is neither a form nor a JSON object.')
  return settled(new NextRequest(request.url, { method: 'POST', headers: request.headers, body }), handle)
}

/** A database that is away is said as everywhere else. */
async function settled(request: Request, handle: Handler): Promise<Response> {
  const result = await attempt(async () => succeed(await handle(request)))
  return result.ok ? result.value : answerFailure(result.failure)
}

function isJsonObject(type: string, body: Buffer): boolean {
  if (!/^application\/json\s*(;|$)/i.test(type)) return false
  try {
    const value: unknown = JSON.parse(body.toString('utf8'))
    return typeof value === 'object' && value !== null && !Array.isArray(value)
  } catch {
    return false
  }
}

function refuse(code: 'too-large' | 'bad-request', message: string): Response {
  return answerFailure({ code, message })
}
