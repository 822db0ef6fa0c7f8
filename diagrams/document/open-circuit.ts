import type { z } from 'zod'
import { checkCircuit, type Problem } from './check-circuit'
import { circuitSchema, type Circuit } from './circuit-schema'
import { bounded, plainMessage } from './plain-message'

export type Opened<T> = { ok: true; value: T } | { ok: false; problems: Problem[] }

/** The one door for a document: shape, defaults and every cross reference. Never throws on bad input. */
export function openCircuit(input: unknown): Opened<Circuit> {
  const parsed = circuitSchema.safeParse(input, { reportInput: true })
  if (!parsed.success) return { ok: false, problems: problemsOf(parsed.error) }
  const problems = checkCircuit(parsed.data)
  return problems.length === 0 ? { ok: true, value: parsed.data } : { ok: false, problems }
}

/** A zod error as paths and plain sentences. Unknown fields get one line each, with their own path. */
export function problemsOf(error: z.ZodError): Problem[] {
  return error.issues.flatMap((issue) => problemsOfIssue(issue, []))
}

function problemsOfIssue(issue: z.core.$ZodIssue, before: PropertyKey[]): Problem[] {
  const at = [...before, ...issue.path]
  const path = at.map((piece) => bounded(String(piece))).join('.')
  if (issue.code === 'unrecognized_keys')
    return issue.keys.map((key) => ({
      path: [...at, bounded(key)].map(String).join('.'),
      message: `unknown field "${bounded(key)}"`,
    }))
  if (issue.code === 'invalid_union') {
    // The branch that got furthest says what is really wrong.
    const branches = issue.errors.filter((errors) => errors.length > 0)
    const deepest = branches.toSorted((x, y) => depth(y) - depth(x))[0]
    if (deepest && depth(deepest) > 0) return deepest.flatMap((inner) => problemsOfIssue(inner, at))
  }
  return [{ path, message: plainMessage(issue) }]
}

function depth(issues: z.core.$ZodIssue[]): number {
  return Math.max(...issues.map((issue) => issue.path.length + (issue.code === 'unrecognized_keys' ? 1 : 0)))
}
