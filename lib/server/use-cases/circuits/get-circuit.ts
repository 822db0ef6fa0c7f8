import { findCircuit } from '@/db/queries/circuits'
import type { StoredCircuit } from '@/lib/shared/api/circuits'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { isId } from '../ids'
import { inTransaction } from '../in-transaction'
import { describeCircuit } from './describe-circuit'

export async function getCircuit(context: Context, { id }: { id: string }): Promise<Result<StoredCircuit>> {
  const { actor } = context
  if (!isId(id) || !can(actor.role, 'circuit.read')) return fail('not-found')
  return inTransaction(context, async (trx) => {
    const head = await findCircuit(trx, actor.organisationId, id)
    return head ? succeed(await describeCircuit(trx, actor, head)) : fail('not-found')
  })
}
