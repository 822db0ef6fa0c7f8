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
    const all = Int32Array.from(bounds, (_, i) => i)
    const found = bounds.some((prediction) => prediction.live)
      ? range
      : scalesBetween(bounds, all, 0, all.length, windows, range)
    if (found) fits.set(state, found)
  }
  return fits
}

/** The same for the predictions `all[index[from]]` … `all[index[to − 1]]` of one state. */
export function scalesBetween(
  all: readonly Prediction[],
  index: Int32Array,
  from: number,
  to: number,
  windows: Windows,
  range: ScaleRange,
): ScaleRange | null {
  let found: ScaleRange | null = null
  for (const window of windows) {
    // Some bound must reach down to the window's top, and some bound up to its foot.
    let [belowLow, belowHigh, aboveLow, aboveHigh] = [Infinity, -Infinity, Infinity, -Infinity]
    for (let i = from; i < to; i++) {
      const { battery, fixed, reachBattery, reachFixed } = all[index[i]!]!
      half(battery - reachBattery, fixed - reachFixed, window.high, range)
      if (edgeLow < belowLow) belowLow = edgeLow
      if (edgeHigh > belowHigh) belowHigh = edgeHigh
      half(-battery - reachBattery, -fixed - reachFixed, -window.low, range)
      if (edgeLow < aboveLow) aboveLow = edgeLow
      if (edgeHigh > aboveHigh) aboveHigh = edgeHigh
    }
    const low = Math.max(belowLow, aboveLow)
    const high = Math.min(belowHigh, aboveHigh)
    if (low <= high + 1e-12)
      found = found ? { low: Math.min(found.low, low), high: Math.max(found.high, high) } : { low, high }
  }
  return found
}

let edgeLow = 0
let edgeHigh = 0

/** Scales s in the range with s·slope + start ≤ limit, into `edgeLow` and `edgeHigh`: this runs for every cell, and what it allocated would add up. */
function half(slope: number, start: number, limit: number, range: ScaleRange) {
  edgeLow = range.low
  edgeHigh = range.high
  if (limit === Infinity) return
  const room = limit - start
  const flat = Math.abs(slope) < 1e-15
  if (!flat && slope > 0) edgeHigh = Math.min(range.high, room / slope)
  else if (!flat) edgeLow = Math.max(range.low, room / slope)
  if (flat ? room < 0 : edgeLow > edgeHigh + 1e-12) {
    edgeLow = Infinity
    edgeHigh = -Infinity
  }
}

/** The smallest range that holds both; null stands for none. */
export function hull(a: ScaleRange | null, b: ScaleRange | null): ScaleRange | null {
  return a && b ? { low: Math.min(a.low, b.low), high: Math.max(a.high, b.high) } : (a ?? b)
}

export function overlap(a: ScaleRange, b: ScaleRange): ScaleRange | null {
  const low = Math.max(a.low, b.low)
  const high = Math.min(a.high, b.high)
  return low <= high + 1e-12 ? { low, high } : null
}
