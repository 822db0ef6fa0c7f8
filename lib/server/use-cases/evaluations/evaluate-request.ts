import type { Answer } from '@/diagrams/faults/answer'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { opened } from '../parse'

/** The evaluator's answer to a circuit and its readings; nothing of it is stored. */
export async function evaluateRequest({ actor }: Context, input: unknown): Promise<Result<Answer>> {
  if (!can(actor.role, 'evaluate')) return fail('not-allowed')
  const request = opened(openEvaluationRequest(input))
  return request.ok ? succeed(evaluate(request.value)) : request
}
