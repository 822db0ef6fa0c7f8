import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import type { Odds } from '@/diagrams/faults/odds-schema'
import type { Symptom } from '@/diagrams/faults/symptom-schema'

export interface Question {
  circuit: Circuit
  readings: Reading[]
  codes: string[]
  priors: 'trade' | 'even'
  odds?: Odds
  symptoms?: Symptom[]
}

/** To the worker and back; the number tells the newest question from one that is no longer asked. */
export type Asked = { number: number; question: Question }
export type Answered =
  | { number: number; ok: true; answer: Answer }
  | { number: number; ok: false; message: string }
