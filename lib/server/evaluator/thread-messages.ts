import type { Opened } from '@/diagrams/document/open-circuit'
import type { Answer } from '@/diagrams/faults/answer'

/** To the evaluator's thread, and what it answers a question with. */
export type EvaluatorAsk = { do: 'ask'; number: number; input: unknown } | { do: 'drop'; number: number }
export type Reply = Opened<Answer>
