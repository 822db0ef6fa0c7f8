import type { Answer } from '@/diagrams/faults/answer'

export interface Counts {
  all: number
  faulty: number
  inQuestion: number
  good: number
}

/** How many places stand where; null until the evaluator has answered. */
export function verdictCounts(answer: Answer | null): Counts | null {
  if (!answer) return null
  const of = (verdict: string) => answer.sites.filter((site) => site.verdict === verdict).length
  return {
    all: answer.sites.length,
    faulty: of('faulty'),
    inQuestion: of('in-question'),
    good: of('proved-good'),
  }
}
