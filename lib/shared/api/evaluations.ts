import type { Answer } from '@/diagrams/faults/answer'

/**
 * `POST /api/v1/evaluations` takes an evaluation request (`openEvaluationRequest` is its door, so the
 * command line and the address refuse alike) and answers with the evaluator's answer as it stands.
 */
export type EvaluationResponse = Answer
