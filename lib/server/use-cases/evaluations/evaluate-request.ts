import type { Answer } from '@/diagrams/faults/answer'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { evaluateApart } from '../../evaluator/evaluate-apart'
import { inTransaction } from '../in-transaction'
import { opened } from '../parse'
import { organisationFindings, organisationOdds } from '../traces/organisation-odds'

/** As the sentence of `evaluation-too-long` says. */
export const mostEvaluationMilliseconds = 30_000

/** The evaluator's answer to a circuit and its readings; nothing of it is stored. */
export async function evaluateRequest(
  context: Context,
  input: unknown,
  { milliseconds = mostEvaluationMilliseconds, signal }: { milliseconds?: number; signal?: AbortSignal } = {},
): Promise<Result<Answer>> {
  if (!can(context.actor.role, 'evaluate')) return fail('not-allowed')
  const reply = await evaluateApart(await withOdds(context, input), milliseconds, signal)
  if (reply === 'too-long') return fail('evaluation-too-long')
  // Whoever has gone reads no answer.
  if (reply === 'busy' || reply === 'gone') return fail('evaluator-busy')
  return opened(reply)
}

/** The table of the organisation, where the request asks for the trade's odds and brings none of its own. */
async function withOdds(context: Context, input: unknown): Promise<unknown> {
  if (typeof input !== 'object' || input === null || Array.isArray(input)) return input
  if ('odds' in input || ('priors' in input && input.priors !== 'trade')) return input
  const findings = await inTransaction(context, async (trx) =>
    succeed(await organisationFindings(trx, context.actor.organisationId)),
  )
  const odds = findings.ok ? organisationOdds(findings.value, null) : null
  return odds ? { ...input, odds } : input
}
