import type { Reading } from '../document/reading-schema'
import type { ScaleRange } from './battery-range'
import type { CellEvidence, Evidence, Included } from './evidence'
import { hull, overlap, type Fits } from './tolerance-rule'

/** Evidence from cells that were judged one by one. */
export function plainEvidence(
  readings: readonly Reading[],
  conditions: number[],
  good: CellEvidence,
  cells: CellEvidence[][],
): Evidence {
  return {
    conditions,
    good,
    cells,
    goodLog: good.logLikelihood,
    logs: cells.map((list) => Float64Array.from(list, (cell) => cell.logLikelihood)),
    fits: (h, c, included = () => true) =>
      fitsAll(readings, conditions, h < 0 ? good : cells[h]![c]!, included),
  }
}

function fitsAll(
  readings: readonly Reading[],
  conditions: readonly number[],
  cell: CellEvidence,
  included: Included,
): boolean {
  let resting: ScaleRange | null = { low: -Infinity, high: Infinity }
  let charging: ScaleRange | null = { low: -Infinity, high: Infinity }
  for (let first = 0; first < readings.length; first++) {
    if (conditions[first] !== first) continue
    const together: Fits[] = []
    for (let r = first; r < readings.length; r++) {
      if (conditions[r] !== first || !included(r)) continue
      if (cell.fits[r]!.size === 0) return false
      together.push(cell.fits[r]!)
    }
    if (together.length === 0) continue
    const fit = scalesOfAll(together)
    if (!fit) return false
    if (readings[first]!.condition.charging) charging = overlap(charging, fit)
    else resting = overlap(resting, fit)
    if (!resting || !charging) return false
  }
  return true
}

/** Battery scales at which some one state fits all readings of a condition. */
function scalesOfAll(together: readonly Fits[]): ScaleRange | null {
  let found: ScaleRange | null = null
  for (const [state, range] of together[0]!) {
    let both: ScaleRange | null = range
    for (const fits of together) {
      const other = fits.get(state)
      both = both && other ? overlap(both, other) : null
    }
    found = hull(found, both)
  }
  return found
}
