import type { z } from 'zod'
import { errorBodySchema } from '@/lib/shared/api/error-body'
import { errors } from '@/lib/shared/errors'
import type { Failure } from '@/lib/shared/result'

/** A failure of a call: one of the server's codes, or the network itself. */
export type CallFailure = Failure & {
  /** True when the same call may succeed later as it stands: no network, server or database away. */
  tryAgain: boolean
}
export type Called<T> = { ok: true; value: T } | { ok: false; failure: CallFailure }

const patienceMilliseconds = 15_000

/** One call to `/api/v1`. Never throws on network or server trouble: that is a value, too. */
export async function callApi<T>(
  method: 'GET' | 'POST' | 'PUT' | 'DELETE',
  path: string,
  schema: z.ZodType<T>,
  body?: unknown,
): Promise<Called<T>> {
  let response: Response
  let text: string
  try {
    response = await fetch(`/api/v1/${path}`, {
      method,
      headers: body === undefined ? {} : { 'content-type': 'application/json' },
      body: body === undefined ? undefined : JSON.stringify(body),
      signal: AbortSignal.timeout(patienceMilliseconds),
    })
    text = await response.text()
  } catch {
    return { ok: false, failure: networkAway }
  }
  const json = readJson(text)
  if (response.ok) {
    const parsed = schema.safeParse(json)
    if (parsed.success) return { ok: true, value: parsed.data }
    return {
      ok: false,
      failure: { ...unexpected, message: 'The server answered in a way this page does not know. Reload it.' },
    }
  }
  const known = errorBodySchema.safeParse(json)
  if (!known.success) return { ok: false, failure: { ...unexpected, tryAgain: response.status >= 500 } }
  return {
    ok: false,
    failure: { ...known.data.error, tryAgain: response.status >= 500 || response.status === 429 },
  }
}

const networkAway: CallFailure = {
  code: 'unexpected',
  message: 'The server cannot be reached. What you entered is kept here and sent when it can be.',
  tryAgain: true,
}
const unexpected: CallFailure = {
  code: 'unexpected',
  message: errors.unexpected.sentence,
  tryAgain: false,
}

function readJson(text: string): unknown {
  try {
    return text === '' ? null : JSON.parse(text)
  } catch {
    return undefined
  }
}
