import { evaluate } from '@/diagrams/evaluate'
import type { EvaluationRequest } from '@/diagrams/faults/request'
import type { TraceRow } from '@/lib/shared/api/traces'

type Progress = TraceRow['progress']

/** Answers already worked out, by trace and moment of its last change; the oldest leave first. */
const known = new Map<string, Progress>()
const mostKnown = 500

/** How far a trace got, for a list. The key changes whenever the trace does. */
export function traceProgress(key: string, request: EvaluationRequest): Progress {
  const before = known.get(key)
  if (before !== undefined) return before
  const answer = evaluate(request)
  const progress: Progress = {
    outcome: answer.outcome,
    places: answer.sites.length,
    left: answer.sites.filter((site) => site.verdict !== 'proved-good').length,
    says: answer.says,
    next: answer.next[0]?.says ?? null,
  }
  known.set(key, progress)
  if (known.size > mostKnown) known.delete(known.keys().next().value ?? key)
  return progress
}
