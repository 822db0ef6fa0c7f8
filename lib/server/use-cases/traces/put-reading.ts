import { isDeepStrictEqual } from 'node:util'
import { listReadings, putReading as writeReading } from '@/db/queries/trace-readings'
import type { Reading } from '@/diagrams/document/reading-schema'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { putReadingSchema, type Trace } from '@/lib/shared/api/traces'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { invalid, parseInput } from '../parse'
import { type OpenedTrace, writeTrace } from './write-trace'

/** As many as the evaluator takes. */
const mostReadings = 200

/** Keeps one reading, or its correction under the same id. A repeated request changes nothing. */
export async function putReading(
  context: Context,
  { id, readingId }: { id: string; readingId: string },
  input: unknown,
): Promise<Result<Trace>> {
  const parsed = parseInput(putReadingSchema, input)
  if (!parsed.ok) return parsed
  const reading = parsed.value
  if (reading.id !== readingId)
    return invalid([
      { path: 'id', message: `id: "${reading.id}" in the body, "${readingId}" in the address` },
    ])
  return writeTrace(context, id, async ({ trx, trace, document }) => {
    const before = await listReadings(trx, trace.organisation_id, id)
    if (before.some((taken) => isDeepStrictEqual(taken, reading))) return succeed(null)
    const refusal = refuse({ trace, document }, reading)
    if (refusal) return refusal
    if (before.length >= mostReadings && !before.some((taken) => taken.id === reading.id))
      return invalid([
        { path: 'id', message: `reading "${reading.id}": a trace holds at most ${mostReadings}` },
      ])
    await writeReading(trx, {
      organisation_id: trace.organisation_id,
      trace_id: id,
      id: reading.id,
      kind: reading.kind,
      reading: JSON.stringify(reading),
      taken_by: context.actor.userId,
      taken_at: context.now,
    })
    return succeed({})
  })
}

function refuse(
  { trace, document }: Pick<OpenedTrace, 'trace' | 'document'>,
  reading: Reading,
): Result<never> | null {
  if (trace.state === 'done') return fail('trace-done')
  if (document.cautions.length > 0 && trace.cautions_answered_at === null) return fail('cautions-first')
  const problem = refuseReading(document, reading)
  return problem ? fail('reading-refused', problem) : null
}
