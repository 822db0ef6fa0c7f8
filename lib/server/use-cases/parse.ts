import type { z } from 'zod'
import { type Opened, problemsOf } from '@/diagrams/document/open-circuit'
import type { Problem } from '@/diagrams/document/check-circuit'
import { fail, type Result, succeed } from '@/lib/shared/result'

/** Input through a schema; what is wrong comes back as the first problem, with all of them as details. */
export function parseInput<T extends z.ZodType>(schema: T, input: unknown): Result<z.output<T>> {
  const text = unstorableText(input, '')
  if (text !== null)
    return fail('invalid', {
      path: text,
      message: `${text || 'the request'}: holds a character that is no text (NUL or half a pair)`,
    })
  const parsed = schema.safeParse(input, { reportInput: true })
  return parsed.success ? succeed(parsed.data) : invalid(problemsOf(parsed.error))
}

/** What `openCircuit` and its like answer, with paths under `base`. */
export function opened<T>(result: Opened<T>, base = ''): Result<T> {
  if (result.ok) return succeed(result.value)
  return invalid(
    result.problems.map(({ path, message }) => ({
      path: [base, path].filter(Boolean).join('.'),
      message,
    })),
  )
}

/** The field is named in the sentence itself, since not every client shows the path. */
export function invalid(problems: Problem[]): Result<never> {
  const sentences = problems.map(({ path, message }) =>
    path === '' || message.startsWith(`${path}:`) ? message : `${path}: ${message}`,
  )
  return fail('invalid', {
    path: problems[0]?.path ?? '',
    message: sentences[0] ?? 'The request is not as expected.',
    ...(sentences.length > 1 ? { details: sentences.slice(0, 50) } : {}),
  })
}

const unstorable = /\0|\p{Surrogate}/u

/** Path of the first text that PostgreSQL cannot keep as it is; null when there is none. */
function unstorableText(value: unknown, path: string): string | null {
  if (typeof value === 'string') return unstorable.test(value) ? path : null
  if (typeof value !== 'object' || value === null) return null
  for (const [key, inner] of Object.entries(value)) {
    if (unstorable.test(key)) return path
    const found = unstorableText(inner, path === '' ? key : `${path}.${key}`)
    if (found !== null) return found
  }
  return null
}
