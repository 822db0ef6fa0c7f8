import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe, Reading, ReadingValue } from '@/diagrams/document/reading-schema'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import type { Context } from '@/lib/server/context'
import { answerCautions } from '@/lib/server/use-cases/traces/answer-cautions'
import { getTrace } from '@/lib/server/use-cases/traces/get-trace'
import { putFinding } from '@/lib/server/use-cases/traces/put-finding'
import { putProof } from '@/lib/server/use-cases/traces/put-proof'
import { putReading } from '@/lib/server/use-cases/traces/put-reading'
import { startTrace } from '@/lib/server/use-cases/traces/start-trace'
import type { Result } from '@/lib/shared/result'
import { type DemoOrganisation, demoId } from './people'
import { type DemoTrace, demoTraces } from './traces'

/** Lays the traces that are missing, each as a technician would: start, cautions, readings, finding, proof. */
export async function layTraces(
  context: Context,
  organisation: DemoOrganisation,
  circuitIds: ReadonlyMap<string, string>,
): Promise<void> {
  for (const [index, trace] of demoTraces.entries()) {
    const id = demoId(organisation, 500 + index)
    const circuitId = circuitIds.get(trace.circuit)
    const there = await getTrace(context, { id })
    if (!there.ok && circuitId) await layTrace(context, id, circuitId, trace)
  }
}

async function layTrace(context: Context, id: string, circuitId: string, trace: DemoTrace): Promise<void> {
  const { vehicle, complaint, codes, fault, probes, ending } = trace
  const begun = context.now.getTime() - trace.hoursAgo * 3_600_000
  const at = (minutes: number): Context => ({ ...context, now: new Date(begun + minutes * 60_000) })
  const started = must(await startTrace(at(0), { id, circuitId, vehicle, complaint, codes }))
  const circuit = started.circuit.document
  if (circuit.cautions.length > 0) must(await answerCautions(at(1), { id }))
  for (const [index, probe] of probes.entries()) {
    const reading = take(circuit, `r${index + 1}`, probe, fault)
    must(await putReading(at(3 + 4 * index), { id, readingId: reading.id }, reading))
  }
  if (!ending) return
  const finding = { site: fault.site, mode: fault.mode, note: ending.note, repaired: true }
  must(await putFinding(at(45), { id }, finding))
  const confirming = take(circuit, 'proof', ending.proof)
  must(await putProof(at(50), { id }, { reading: confirming, works: true }))
}

/** The reading that the meter gives on this circuit, with the fault in or repaired. */
function take(circuit: Circuit, id: string, probe: Probe, fault?: PlantedFault): Reading {
  const measured = measure(circuit, probe, fault)
  if (!measured.ok) throw new Error(`${circuit.title}, ${id}: ${measured.problem.message}`)
  return readingSchema.parse({ id, ...probe, value: asDisplayed(measured.value) })
}

/** Two decimals, as a hand-held meter shows them in these ranges. */
function asDisplayed(value: ReadingValue): ReadingValue {
  return typeof value === 'number' ? Math.round(value * 100) / 100 + 0 : value
}

function must<T>(result: Result<T>): T {
  if (!result.ok) throw new Error(`${result.failure.code}: ${result.failure.message}`)
  return result.value
}
