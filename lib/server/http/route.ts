import { fail, type Result, succeed } from '@/lib/shared/result'
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
  /** Fires when whoever asked has gone. */
  signal: AbortSignal
}

interface Spec<C, T> {
  /** Takes a JSON body of at most 2 MB. */
  body?: boolean
  status?: number
  use: (context: C, parts: Parts) => Promise<Result<T>>
  /** Makes the answer of a success, where it is not plain JSON. */
  respond?: (value: T) => Response
}

type Handler = (request: Request, segment: { params: Promise<Record<string, string>> }) => Promise<Response>

/** The one wrapper of every route: same origin, session, body and limits on the way in, errors on the way out. */
export function route<T>(spec: Spec<Context, T>): Handler {
  return serve(spec, async (request) => {
    const session = await sessionOfCookie(openContext().db, cookieOf(request, sessionCookieName()))
    return session ? succeed(contextFor(session.actor)) : fail('not-signed-in')
  })
}

/** The same for everybody, signed in or not. */
export function openRoute<T>(spec: Spec<OpenContext, T>): Handler {
  return serve(spec, async () => succeed(openContext()))
}

function serve<C, T>(spec: Spec<C, T>, contextOf: (request: Request) => Promise<Result<C>>): Handler {
  return async (request, segment) => {
    const result = await attempt(async () => {
      const reads = request.method === 'GET' || request.method === 'HEAD'
      if (!reads && !isSameOrigin(request)) return fail('wrong-origin')
      // Before the body: nobody unknown gets two megabytes read.
      const context = await contextOf(request)
      if (!context.ok) return context
      const body = spec.body ? await readJsonBody(request) : succeed(undefined)
      if (!body.ok) return body
      return spec.use(context.value, {
        params: await segment.params,
        query: Object.fromEntries(new URL(request.url).searchParams),
        body: body.value,
        signal: request.signal,
      })
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
