import type { Reading } from '../document/reading-schema'
import type { Evidence, Included } from './evidence'
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
  const cellsOf = new Map<string, [h: number, c: number][]>(sites.map((site) => [site, []]))
  model.hypotheses.forEach(({ site, cells }, h) => {
    const list = cellsOf.get(site)
    for (let c = 0; list && c < cells.length; c++) list.push([h, c])
  })
  return new Map(sites.map((site) => [site, clearanceOf(evidence, cellsOf.get(site)!, readings)]))
}

function clearanceOf(
  evidence: Evidence,
  cells: readonly (readonly [h: number, c: number])[],
  readings: readonly Reading[],
): Clearance {
  // Cells that fitted once are asked first: what fits many readings often fits fewer, too.
  let last = 0
  const clearedWith = (included?: Included) => {
    for (let i = 0; i < cells.length; i++) {
      const at = (last + i) % cells.length
      if (!evidence.fits(...cells[at]!, included)) continue
      last = at
      return false
    }
    return true
  }
  // Without any reading nothing is proved, also not what could never show.
  if (readings.length === 0 || !clearedWith()) return { cleared: false, firm: false, clearedBy: [] }
  const firm = readings.every((_, out) => clearedWith((r) => r !== out))
  const kept = new Set(readings.keys())
  for (let r = readings.length - 1; r >= 0; r--) {
    kept.delete(r)
    if (!clearedWith((index) => kept.has(index))) kept.add(r)
  }
  return { cleared: true, firm, clearedBy: [...kept].map((r) => readings[r]!.id) }
}
