import { type ErrorCode, errors } from './errors'

/** An expected failure, as a use case returns it and as a route answers it. */
export interface Failure {
  code: ErrorCode
  /** One plain sentence. */
  message: string
  /** The field it is about, as in `document.nodes.3.kind`. */
  path?: string
  /** Further sentences, one each: every problem of a document, every difference of a connector. */
  details?: string[]
}

export type Result<T> = { ok: true; value: T } | { ok: false; failure: Failure }

export function succeed<T>(value: T): Result<T> {
  return { ok: true, value }
}

/** Without a message of its own the failure says the sentence of its code. */
export function fail(code: ErrorCode, more: Partial<Omit<Failure, 'code'>> = {}): Result<never> {
  return { ok: false, failure: { code, message: errors[code].sentence, ...more } }
}
