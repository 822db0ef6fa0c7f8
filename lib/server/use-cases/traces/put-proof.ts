import { isDeepStrictEqual } from 'node:util'
import { findFinding, findProof, putProof as writeProof } from '@/db/queries/traces'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { putProofSchema, type Trace } from '@/lib/shared/api/traces'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { parseInput } from '../parse'
import { writeTrace } from './write-trace'

/** Records the confirming reading. The trace is done once the circuit works again; else it stays open. */
export async function putProof(
  context: Context,
  { id }: { id: string },
  input: unknown,
): Promise<Result<Trace>> {
  const parsed = parseInput(putProofSchema, input)
  if (!parsed.ok) return parsed
  const { reading, works } = parsed.value
  return writeTrace(context, id, async ({ trx, trace, document }) => {
    const before = await findProof(trx, trace.organisation_id, id)
    if (before && before.works === works && isDeepStrictEqual(before.reading, reading)) return succeed(null)
    if (trace.state === 'done') return fail('trace-done')
    const finding = await findFinding(trx, trace.organisation_id, id)
    if (!finding || (finding.site !== null && !finding.repaired)) return fail('finding-first')
    const problem = refuseReading(document, reading)
    if (problem) return fail('reading-refused', { message: problem.message, path: `reading.${problem.path}` })
    await writeProof(trx, {
      organisation_id: trace.organisation_id,
      trace_id: id,
      reading: JSON.stringify(reading),
      works,
      proved_by: context.actor.userId,
      proved_at: context.now,
    })
    return succeed(works ? { state: 'done' as const } : {})
  })
}
