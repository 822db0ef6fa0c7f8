import { setImmediate as letOthersRun } from 'node:timers/promises'
import { sitesOf } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import type { EvaluationRequest } from '@/diagrams/faults/request'
import type { TraceRow } from '@/lib/shared/api/traces'

type Progress = NonNullable<TraceRow['progress']>

/** Answers already worked out, by trace and moment of its last change; the oldest leave first. */
const known = new Map<string, Progress>()
const mostKnown = 500

/** Thinking that one list may cost. What does not fit in is worked out when the list is asked for again. */
const budgetMilliseconds = 500

export interface ProgressQuestion {
  /** Changes whenever the trace does. */
  key: string
  request: EvaluationRequest
}

/** How far traces got, in their order, within the time that a list may take; null where it ran out. */
export async function traceProgress(questions: (ProgressQuestion | null)[]): Promise<(Progress | null)[]> {
  const until = performance.now() + budgetMilliseconds
  const answers: (Progress | null)[] = []
  for (const question of questions) {
    let progress = question && (atTheStart(question.request) ?? known.get(question.key))
    if (question && !progress && performance.now() < until) {
      await letOthersRun()
      progress = remember(question.key, progressOf(question.request))
    }
    answers.push(progress ?? null)
  }
  return answers
}

/** Before the first reading every place is left; that takes no thinking. */
function atTheStart({ circuit, readings }: EvaluationRequest): Progress | null {
  if (readings.length > 0) return null
  const places = sitesOf(circuit).length
  return { outcome: 'narrowed', places, left: places, says: 'No reading yet.', next: null }
}

function progressOf(request: EvaluationRequest): Progress {
  const answer = evaluate(request)
  return {
    outcome: answer.outcome,
    places: answer.sites.length,
    left: answer.sites.filter((site) => site.verdict !== 'proved-good').length,
    says: answer.says,
    next: answer.next[0]?.says ?? null,
  }
}

function remember(key: string, progress: Progress): Progress {
  known.set(key, progress)
  if (known.size > mostKnown) known.delete(known.keys().next().value ?? key)
  return progress
}
