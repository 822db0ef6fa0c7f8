import { samples } from '@/diagrams/samples/all-samples'
import type { Context } from '@/lib/server/context'
import { createCircuit } from '@/lib/server/use-cases/circuits/create-circuit'
import { type DemoOrganisation, demoId } from './people'

/** Imports every sample; what was laid before, changed or deleted since, is left as it is. Answers ids by title. */
export async function layCircuits(
  context: Context,
  organisation: DemoOrganisation,
): Promise<Map<string, string>> {
  const ids = new Map<string, string>()
  for (const [index, document] of samples.entries()) {
    const id = demoId(organisation, index)
    const made = await createCircuit(context, { id, document, connectors: 'refuse' })
    // Deleted by somebody, or its connectors were changed: theirs counts.
    const theirs = !made.ok && ['id-taken', 'connector-differs'].includes(made.failure.code)
    if (!made.ok && !theirs) throw new Error(`sample "${document.title}": ${made.failure.message}`)
    if (made.ok) ids.set(document.title, id)
  }
  return ids
}
