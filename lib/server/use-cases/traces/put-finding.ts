import { findFinding, putFinding as writeFinding } from '@/db/queries/traces'
import { siteName, sitesOf } from '@/diagrams/document/sites'
import { putFindingSchema, type Trace } from '@/lib/shared/api/traces'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { invalid, parseInput } from '../parse'
import { writeTrace } from './write-trace'

/** Records what was found, in which place and way, and whether it was repaired. */
export async function putFinding(
  context: Context,
  { id }: { id: string },
  input: unknown,
): Promise<Result<Trace>> {
  const parsed = parseInput(putFindingSchema, input)
  if (!parsed.ok) return parsed
  const { site, mode, note, repaired } = parsed.value
  return writeTrace(context, id, async ({ trx, trace, document }) => {
    const before = await findFinding(trx, trace.organisation_id, id)
    const same =
      before?.site === site && before.mode === mode && before.note === note && before.repaired === repaired
    if (before && same) return succeed(null)
    if (trace.state === 'done') return fail('trace-done')
    if (site !== null && mode !== null) {
      const place = sitesOf(document).find((candidate) => candidate.id === site)
      if (!place) return invalid([{ path: 'site', message: `site: place "${site}" is not in this circuit` }])
      if (!place.modes.includes(mode))
        return invalid([
          {
            path: 'mode',
            message: `mode: ${siteName(document, site)} cannot be ${mode}; expected ${place.modes.join(', ')}`,
          },
        ])
    }
    await writeFinding(trx, {
      organisation_id: trace.organisation_id,
      trace_id: id,
      site,
      mode,
      note,
      repaired,
      found_by: context.actor.userId,
      found_at: context.now,
    })
    return succeed({})
  })
}
