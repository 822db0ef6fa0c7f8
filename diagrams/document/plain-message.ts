import type { z } from 'zod'

type Issue = z.core.$ZodIssue

/**
 * What is wrong with one field, in plain words: its value where that is known and short, then what
 * was expected, as in `0: expected more than 0`. Messages that a schema words itself are kept.
 * The value is known when the parse was asked to report its input.
 */
export function plainMessage(issue: Issue): string {
  if (!/^(Invalid|Too (small|big)|Unrecognized)\b/.test(issue.message)) return bounded(issue.message)
  switch (issue.code) {
    case 'invalid_type': {
      const received = /received (\w+)/.exec(issue.message)?.[1]
      return received === 'undefined'
        ? `missing: expected ${typeName(issue.expected)}`
        : says(issue, `expected ${typeName(issue.expected)}`, received && typeName(received))
    }
    case 'invalid_value':
      return issue.message.endsWith('received undefined') || ('input' in issue && issue.input === undefined)
        ? `missing: ${expectedOneOf(issue.values)}`
        : says(issue, expectedOneOf(issue.values), kindOf(issue.input))
    case 'too_small':
      return says(issue, expectedSize(issue, issue.inclusive === false ? 'more than' : 'at least'))
    case 'too_big':
      return says(issue, expectedSize(issue, issue.inclusive === false ? 'less than' : 'at most'))
    case 'invalid_key':
      return issue.issues[0] ? plainMessage(issue.issues[0]) : 'a name that cannot be used here'
    case 'invalid_union':
      return issue.discriminator === undefined ? noForm(issue) : unknownKind(issue)
    default:
      return issue.message
  }
}

/** Messages repeat what was sent: enough of it to be found again, not megabytes. */
export function bounded(text: string): string {
  return text.length <= 300 ? text : `${text.slice(0, 60)} … ${text.slice(-200)}`
}

function kindOf(value: unknown): string | undefined {
  if (Array.isArray(value)) return 'a list'
  return typeof value === 'object' && value !== null ? 'an object' : undefined
}

/** Value and expectation; without the value, the expectation alone. */
function says(issue: Issue, expected: string, standIn?: string): string {
  const value = shown(issue.input) ?? standIn
  return value === undefined ? expected : `${value}: ${expected}`
}

function shown(value: unknown): string | undefined {
  if (typeof value === 'string') return value.length > 40 ? undefined : `"${value}"`
  return typeof value === 'number' || typeof value === 'boolean' || value === null ? String(value) : undefined
}

function typeName(type: string): string {
  const names: Record<string, string> = {
    string: 'text',
    number: 'a number',
    int: 'a whole number',
    boolean: 'true or false',
    array: 'a list',
    object: 'an object',
    record: 'an object',
    null: 'nothing',
  }
  return names[type] ?? type
}

function expectedOneOf(values: readonly unknown[]): string {
  const list = values.map((value) => (typeof value === 'string' ? `"${value}"` : String(value)))
  return list.length === 1 ? `expected ${list[0]}` : `expected one of ${list.join(', ')}`
}

function expectedSize(
  issue: Extract<Issue, { code: 'too_small' | 'too_big' }>,
  bound: 'more than' | 'at least' | 'less than' | 'at most',
): string {
  const limit = Number(issue.code === 'too_small' ? issue.minimum : issue.maximum)
  const unit =
    issue.origin === 'string'
      ? 'character'
      : issue.origin === 'array' || issue.origin === 'set'
        ? 'entry'
        : ''
  const plural = unit === 'entry' ? 'entries' : `${unit}s`
  return `expected ${bound} ${limit}${unit && ` ${limit === 1 ? unit : plural}`}`
}

function unknownKind(issue: Extract<Issue, { code: 'invalid_union' }>): string {
  const field = issue.discriminator!
  const input: unknown = issue.input
  const value =
    typeof input === 'object' && input !== null ? (input as Record<string, unknown>)[field] : undefined
  const options = 'options' in issue && Array.isArray(issue.options) ? issue.options : []
  const expected = options.length === 0 ? '' : `: ${expectedOneOf(options)}`
  return value === undefined
    ? `${field} missing or unknown${expected}`
    : `unknown ${field} ${shown(value) ?? kindOf(value) ?? 'text'}${expected}`
}

/** A value that fits none of several forms: what each would have been. */
function noForm(issue: Extract<Issue, { code: 'invalid_union' }>): string {
  const first = issue.errors
    .flatMap((errors) => errors.slice(0, 1))
    .filter((inner) => inner.path.length === 0)
  // A form that fits but for its bounds says more than the list of forms.
  const near = first.find((inner) => inner.code !== 'invalid_type' && inner.code !== 'invalid_value')
  if (near) return plainMessage(near)
  const forms = first.flatMap((inner) =>
    inner.code === 'invalid_value'
      ? inner.values.map((value) => (typeof value === 'string' ? `"${value}"` : String(value)))
      : inner.code === 'invalid_type'
        ? [typeName(inner.expected)]
        : [],
  )
  const expected = forms.length === 0 ? 'none of the allowed forms fits' : `expected ${forms.join(' or ')}`
  const missing = first.some((inner) => inner.message.endsWith('received undefined'))
  return missing ? `missing: ${expected}` : says(issue, expected, kindOf(issue.input))
}
