import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import type { Odds } from '@/diagrams/faults/odds-schema'
import type { Symptom } from '@/diagrams/faults/symptom-schema'
import type { Told } from '@/lib/shared/evaluator/question-runner'

export interface Question {
  circuit: Circuit
  readings: Reading[]
  codes: string[]
  priors: 'trade' | 'even'
  odds?: Odds
  symptoms?: Symptom[]
}

/**
 * To the worker; the number tells the newest question from one that is no longer asked. The circuit, by far the largest
 * part, comes only when it is another one than in the question before.
 */
export type Asked = { number: number; question: Omit<Question, 'circuit'> & { circuit?: Circuit } }
export type Answered = Told<Answer>
