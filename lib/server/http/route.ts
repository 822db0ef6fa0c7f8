import { fail, type Result } from '@/lib/shared/result'
import type { Context, OpenContext } from '../context'
import { answerFailure, answerWith } from './answer'
import { attempt } from './attempt'
import { contextFor, openContext } from './context-for'
import { readJsonBody } from './read-body'
import { isSameOrigin } from './same-origin'
import { sessionCookieName, sessionOfCookie } from './session-cookie'

interface Parts {
  /** The names in brackets of the address. */
  params: Record<string, string>
  query: Record<string, string>
  /** Parsed JSON, or undefined when the route takes none. */
  body: unknown
}

interface Spec<T> {
  /** Takes a JSON body of at most 2 MB. */
  body?: boolean
  status?: number
  use: (context: Context, parts: Parts) => Promise<Result<T>>
  /** Makes the answer of a success, where it is not plain JSON. */
  respond?: (value: T) => Response
}

interface OpenSpec<T> extends Omit<Spec<T>, 'use'> {
  /** For everybody, signed in or not. */
  open: true
  use: (context: OpenContext, parts: Parts) => Promise<Result<T>>
}

type Handler = (request: Request, segment: { params: Promise<Record<string, string>> }) => Promise<Response>

/** The one wrapper of every route: same origin, session, body and limits on the way in, errors on the way out. */
export function route<T>(spec: Spec<T> | OpenSpec<T>): Handler {
  return async (request, segment) => {
    const result = await attempt(async () => {
      const reads = request.method === 'GET' || request.method === 'HEAD'
      if (!reads && !isSameOrigin(request)) return fail('wrong-origin')
      const session =
        'open' in spec
          ? null
          : await sessionOfCookie(openContext().db, cookieOf(request, sessionCookieName()))
      if (!('open' in spec) && !session) return fail('not-signed-in')
      const body = spec.body ? await readJsonBody(request) : undefined
      if (body && !body.ok) return body
      const parts: Parts = {
        params: await segment.params,
        query: Object.fromEntries(new URL(request.url).searchParams),
        body: body?.value,
      }
      if ('open' in spec) return spec.use(openContext(), parts)
      return session ? spec.use(contextFor(session.actor), parts) : fail('not-signed-in')
    })
    if (!result.ok) return answerFailure(result.failure)
    return spec.respond ? spec.respond(result.value) : answerWith(result.value, spec.status ?? 200)
  }
}

function cookieOf(request: Request, name: string): string | undefined {
  for (const part of (request.headers.get('cookie') ?? '').split(';')) {
    const equals = part.indexOf('=')
    if (equals > 0 && part.slice(0, equals).trim() === name) return part.slice(equals + 1).trim()
  }
  return undefined
}
