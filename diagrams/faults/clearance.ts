import type { Reading } from '../document/reading-schema'
import { fitsAll, type CellEvidence, type Evidence } from './evidence'
import type { FaultModel } from './fault-model'

export interface Clearance {
  cleared: boolean
  firm: boolean
  /** Ids of readings that suffice, in the order taken. */
  clearedBy: string[]
}

/**
 * The one rule of the format's page, per site: proved good when no fault of it, in any mode, at any
 * severity, within the tolerances, fits all readings, each within its accuracy.
 */
export function clearances(
  model: FaultModel,
  evidence: Evidence,
  readings: readonly Reading[],
  sites: readonly string[],
): Map<string, Clearance> {
  const cellsOf = new Map<string, CellEvidence[]>(sites.map((site) => [site, []]))
  model.hypotheses.forEach((hypothesis, h) => cellsOf.get(hypothesis.site)?.push(...evidence.cells[h]!))
  return new Map(sites.map((site) => [site, clearanceOf(evidence, cellsOf.get(site)!, readings)]))
}

function clearanceOf(
  evidence: Evidence,
  cells: readonly CellEvidence[],
  readings: readonly Reading[],
): Clearance {
  const clearedWith = (included: (index: number) => boolean) =>
    cells.every((cell) => !fitsAll(evidence, cell, readings, included))
  // Without any reading nothing is proved, also not what could never show.
  if (readings.length === 0 || !clearedWith(() => true)) return { cleared: false, firm: false, clearedBy: [] }
  const firm = readings.every((_, out) => clearedWith((r) => r !== out))
  const kept = new Set(readings.keys())
  for (let r = readings.length - 1; r >= 0; r--) {
    kept.delete(r)
    if (!clearedWith((index) => kept.has(index))) kept.add(r)
  }
  return { cleared: true, firm, clearedBy: [...kept].map((r) => readings[r]!.id) }
}
