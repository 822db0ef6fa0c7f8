import { z } from 'zod'
import { fail, type Result, succeed } from '@/lib/shared/result'
import { parseInput } from '../parse'

export const circuitCursorSchema = z.strictObject({ titleKey: z.string(), circuitId: z.uuid() })
export const placeCursorSchema = z.strictObject({
  connectorKey: z.string(),
  number: z.int(),
  circuitId: z.uuid(),
  wire: z.string(),
  side: z.enum(['from', 'to']),
})

/** The last row of a page, so that the next one starts behind it whatever was added meanwhile. */
export function sealCursor(after: unknown): string {
  return Buffer.from(JSON.stringify(after)).toString('base64url')
}

export function openCursor<T extends z.ZodType>(
  schema: T,
  text: string | undefined,
): Result<z.output<T> | null> {
  if (text === undefined || text === '') return succeed(null)
  let value: unknown
  try {
    value = JSON.parse(Buffer.from(text, 'base64url').toString('utf8'))
  } catch {
    value = undefined
  }
  const parsed = parseInput(schema, value)
  if (parsed.ok) return succeed(parsed.value)
  return fail('invalid', { path: 'cursor', message: 'cursor: not one that a page of this search gave' })
}
