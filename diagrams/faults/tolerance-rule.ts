import type { Reading } from '../document/reading-schema'
import { ohmmeterLimitOhms } from '../solver/constants'
import type { ScaleRange } from './battery-range'
import { loadThreshold, type ReadingScope } from './reading-scope'
import type { Prediction } from './prediction'
import type { CellPrediction } from './prediction-table'

/** Values of the quantity itself that a reading allows, its accuracy taken as a limit. Several: any of them. */
export type Windows = readonly { low: number; high: number }[]

/** Rounding in the arithmetic must never decide: volt, ohm and ampere. */
const hair = 1e-6

export function windowsOf(reading: Reading, scope: ReadingScope): Windows {
  switch (reading.kind) {
    case 'works': {
      const threshold = loadThreshold(scope, reading.node)
      return reading.value
        ? [
            { low: threshold - hair, high: Infinity },
            { low: -Infinity, high: hair - threshold },
          ]
        : [{ low: -threshold - hair, high: threshold + hair }]
    }
    case 'sees': {
      const { threshold } = scope.network.inputs.find((input) => input.point === reading.pin)!
      return reading.value === 'high'
        ? [{ low: threshold - hair, high: Infinity }]
        : [{ low: -Infinity, high: threshold + hair }]
    }
    default: {
      const { percent, floor } = accuracyOf(reading)
      if (reading.value === 'OL')
        return reading.kind === 'ohms'
          ? [{ low: (ohmmeterLimitOhms - floor) * (1 - percent / 100), high: Infinity }]
          : []
      // The limit is a part of the true value or of the shown one: the wider of the two.
      const margin = ((percent / 100) * Math.abs(reading.value) + floor) / (1 - percent / 100) + hair
      return [{ low: reading.value - margin, high: reading.value + margin }]
    }
  }
}

/** Limits of the meter in use, percent of the value and a floor in the reading's own unit. */
export function accuracyOf(reading: Reading): { percent: number; floor: number } {
  if (reading.accuracy) return reading.accuracy
  switch (reading.kind) {
    case 'ohms':
      return { percent: 0.5, floor: 0.2 }
    case 'amps':
      return { percent: 2, floor: 0.05 }
    default:
      return { percent: 0.5, floor: 0.02 }
  }
}

/** Battery scales that fit a reading, by the state the parts are in; a state that never fits is left out. */
export type Fits = ReadonlyMap<string, ScaleRange>

/** Key for a circuit that may be in any state at all. */
export const anyState = 'any'

/**
 * Battery scales at which a cell may give the reading, for each state its parts may be in. Ranges
 * are only ever widened, so a fault that fits is never excluded: for a fixed battery, fixed parts
 * and a fixed state a reading is monotone in the severity, hence lies between the cell's ends, each
 * within its reach.
 */
export function scalesThatFit(cell: CellPrediction, windows: Windows, range: ScaleRange): Fits {
  if (cell.bounds === null) return new Map([[anyState, range]])
  const fits = new Map<string, ScaleRange>()
  for (const [state, bounds] of cell.bounds) {
    const found = bounds.some((prediction) => prediction.live) ? range : scalesBetween(bounds, windows, range)
    if (found) fits.set(state, found)
  }
  return fits
}

function scalesBetween(
  bounds: readonly Prediction[],
  windows: Windows,
  range: ScaleRange,
): ScaleRange | null {
  let found: ScaleRange | null = null
  for (const window of windows) {
    // Some bound must reach down to the window's top, and some bound up to its foot.
    const below = widest(bounds, (p) =>
      half(p.battery - p.reachBattery, p.fixed - p.reachFixed, window.high, range),
    )
    const above = widest(bounds, (p) =>
      half(-p.battery - p.reachBattery, -p.fixed - p.reachFixed, -window.low, range),
    )
    found = hull(found, below && above && overlap(below, above))
  }
  return found
}

/** The smallest range that holds both; null stands for none. */
export function hull(a: ScaleRange | null, b: ScaleRange | null): ScaleRange | null {
  return a && b ? { low: Math.min(a.low, b.low), high: Math.max(a.high, b.high) } : (a ?? b)
}

/** Scales s in the range with s·slope + start ≤ limit. */
function half(slope: number, start: number, limit: number, range: ScaleRange): ScaleRange | null {
  if (limit === Infinity) return range
  const room = limit - start
  if (Math.abs(slope) < 1e-15) return room >= 0 ? range : null
  const edge = room / slope
  const found =
    slope > 0
      ? { low: range.low, high: Math.min(range.high, edge) }
      : { low: Math.max(range.low, edge), high: range.high }
  return found.low <= found.high + 1e-12 ? found : null
}

function widest(
  bounds: readonly Prediction[],
  rangeOf: (p: Prediction) => ScaleRange | null,
): ScaleRange | null {
  let found: ScaleRange | null = null
  for (const prediction of bounds) found = hull(found, rangeOf(prediction))
  return found
}

export function overlap(a: ScaleRange, b: ScaleRange): ScaleRange | null {
  const low = Math.max(a.low, b.low)
  const high = Math.min(a.high, b.high)
  return low <= high + 1e-12 ? { low, high } : null
}
