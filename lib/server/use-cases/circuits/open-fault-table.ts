import { type TableFormat, tableFormats } from '@/diagrams/fault-table/table-lines'
import { can } from '@/lib/shared/permissions'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { Context } from '../../context'
import { faultTableStream } from '../../fault-table/fault-table-stream'
import { getCircuit } from './get-circuit'

export interface FaultTableFile {
  title: string
  format: TableFormat
  bytes: ReadableStream<Uint8Array>
}

/** The fault table of a stored circuit, as a file that is written while it is taken. */
export async function openFaultTable(
  context: Context,
  { id, format = 'csv' }: { id: string; format?: string | undefined },
): Promise<Result<FaultTableFile>> {
  // First, so that a role that may read but not evaluate is told alike whether the circuit is there or not.
  if (!can(context.actor.role, 'evaluate')) return fail('not-allowed')
  const wanted = tableFormats.find((one) => one === format)
  if (!wanted)
    return fail('invalid', {
      path: 'format',
      message: `format "${format}": expected ${tableFormats.join(' or ')}`,
    })
  const found = await getCircuit(context, { id })
  if (!found.ok) return found
  const { document } = found.value
  const bytes = faultTableStream(document, wanted)
  return bytes === 'busy' ? fail('evaluator-busy') : succeed({ title: document.title, format: wanted, bytes })
}
