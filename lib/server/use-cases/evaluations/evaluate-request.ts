import type { Answer } from '@/diagrams/faults/answer'
import { can } from '@/lib/shared/permissions'
import { fail, type Result } from '@/lib/shared/result'
import type { Context } from '../../context'
import { evaluateApart } from '../../evaluator/evaluate-apart'
import { opened } from '../parse'

/** As the sentence of `evaluation-too-long` says. */
export const mostEvaluationMilliseconds = 30_000

/** The evaluator's answer to a circuit and its readings; nothing of it is stored. */
export async function evaluateRequest(
  { actor }: Context,
  input: unknown,
  { milliseconds = mostEvaluationMilliseconds } = {},
): Promise<Result<Answer>> {
  if (!can(actor.role, 'evaluate')) return fail('not-allowed')
  const reply = await evaluateApart(input, milliseconds)
  if (reply === 'too-long') return fail('evaluation-too-long')
  if (reply === 'busy') return fail('evaluator-busy')
  return opened(reply)
}
