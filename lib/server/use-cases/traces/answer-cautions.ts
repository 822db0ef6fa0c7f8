import type { Trace } from '@/lib/shared/api/traces'
import { type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { writeTrace } from './write-trace'

/** Notes that the circuit's cautions were answered; the first time counts. */
export function answerCautions(context: Context, { id }: { id: string }): Promise<Result<Trace>> {
  return writeTrace(context, id, async ({ trace }) =>
    succeed(trace.cautions_answered_at === null ? { cautions_answered_at: context.now } : null),
  )
}
