import { setTimeout as wait } from 'node:timers/promises'
import { sitesOf } from '@/diagrams/document/sites'
import type { Answer } from '@/diagrams/faults/answer'
import type { EvaluationRequest } from '@/diagrams/faults/request'
import type { TraceRow } from '@/lib/shared/api/traces'
import { evaluateApart, evaluatorReady } from '../../evaluator/evaluate-apart'
import { log } from '../../log'

type Progress = NonNullable<TraceRow['progress']>

/** Answers already worked out, by trace and moment of its last change; null: it takes too long. The oldest leave first. */
const known = new Map<string, Progress | null>()
const mostKnown = 500
/** Questions that are being worked out, so that none is asked twice. */
const asked = new Map<string, Promise<void>>()

/** Waiting that one list may cost. What is not ready by then is there when the list is asked for again. */
const budgetMilliseconds = 3000
const mostMilliseconds = 10_000

export interface ProgressQuestion {
  /** Changes whenever the trace does. */
  key: string
  request: EvaluationRequest
}

/** How far traces got, in their order, within the time that a list may take; null where it ran out. */
export async function traceProgress(questions: (ProgressQuestion | null)[]): Promise<(Progress | null)[]> {
  const missing = (question: ProgressQuestion | null) =>
    question !== null && !atTheStart(question.request) && !known.has(question.key)
  // Its start, once in the life of the server, is no work on these traces.
  if (questions.some(missing)) await evaluatorReady().catch(() => {})
  const until = performance.now() + budgetMilliseconds
  const out = wait(budgetMilliseconds, undefined, { ref: false })
  const answers: (Progress | null)[] = []
  for (const question of questions) {
    const start = question && atTheStart(question.request)
    if (question && !start && !known.has(question.key) && performance.now() < until)
      await Promise.race([workOut(question), out])
    answers.push(start ?? (question && known.get(question.key)) ?? null)
  }
  return answers
}

/** Works one out in the evaluator's thread and keeps it, whether or not the list still waits. */
function workOut({ key, request }: ProgressQuestion): Promise<void> {
  let work = asked.get(key)
  if (!work) {
    work = evaluateApart(request, mostMilliseconds)
      .then((reply) => {
        if (reply === 'busy' || reply === 'gone') return
        remember(key, reply !== 'too-long' && reply.ok ? progressOf(reply.value) : null)
      })
      .catch((error: unknown) => log.error(error, 'the evaluator failed'))
      .finally(() => asked.delete(key))
    asked.set(key, work)
  }
  return work
}

/** Before the first reading every place is left; that takes no thinking. */
function atTheStart({ circuit, readings }: EvaluationRequest): Progress | null {
  if (readings.length > 0) return null
  const places = sitesOf(circuit).length
  return { outcome: 'narrowed', places, left: places, says: 'No reading yet.', next: null }
}

function progressOf(answer: Answer): Progress {
  return {
    outcome: answer.outcome,
    places: answer.sites.length,
    left: answer.sites.filter((site) => site.verdict !== 'proved-good').length,
    says: answer.says,
    next: answer.next[0]?.says ?? null,
  }
}

function remember(key: string, progress: Progress | null): void {
  known.set(key, progress)
  if (known.size > mostKnown) known.delete(known.keys().next().value ?? key)
}
