import type { Reading } from '../document/reading-schema'
import { nominalBatteryVolts } from '../solver/constants'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { Network } from '../solver/network'
import type { Hypothesis } from './hypothesis'
import { likelihoodOf } from './likelihood'
import { accuracyOf, scalesBetween, windowsOf } from './tolerance-rule'
import type { Prediction } from './prediction'
import type { PredictionTable } from './prediction-table'

/** Steps in which the battery's range is gone through. */
export const batterySteps = 21

/**
 * One reading judged against every cell (numbered through, 0 the good circuit).
 *
 * Cells that foretell the same, to a fiftieth of what the meter can tell, share their likelihoods:
 * most faults leave most readings as they are.
 */
export interface JudgedReading {
  table: PredictionTable
  /** Battery scales that fit, per entry of the table's states; low above high where none does. */
  fitLow: Float64Array
  fitHigh: Float64Array
  /** Per cell: 1 when no state at any battery fits. */
  misfits: Uint8Array
  /** Per cell: which row of `logs`, in the state of its first and of its other end. */
  row: Int32Array
  otherRow: Int32Array
  /** ln of the likelihood at every battery step, row by row. */
  logs: readonly Float64Array[]
  /** The most of each row. */
  peaks: readonly number[]
}

/** `hypotheses` are those of the table, whose cells it numbers through. */
export function judgeReading(
  network: Network,
  hypotheses: readonly Hypothesis[],
  table: PredictionTable,
  reading: Reading,
): JudgedReading {
  const { states, bounds } = table
  const { first, firstBound, bound, low, high, restless } = states
  const cells = first.length - 1
  const scope = { network }
  const windows = windowsOf(reading, scope)
  const range = reading.condition.charging ? chargingRange : restingRange
  const fitLow = new Float64Array(states.state.length).fill(1)
  const fitHigh = new Float64Array(states.state.length)
  const misfits = new Uint8Array(cells)
  const rowsOf = new RowMaker(reading, scope, range)
  const row = new Int32Array(cells)
  const otherRow = new Int32Array(cells)
  const judge = (cell: number, weak: ScaleRange | null) => {
    if (restless[cell]) {
      row[cell] = otherRow[cell] = rowsOf.flat(weak)
      return
    }
    let fits = false
    let one = -1
    let other = -1
    for (let entry = first[cell]!; entry < first[cell + 1]!; entry++) {
      const found = scalesOf(
        bounds,
        bound,
        firstBound[entry]!,
        firstBound[entry + 1]!,
        weak ? weakRange : range,
      )
      if (found) {
        fits = true
        fitLow[entry] = found.low
        fitHigh[entry] = found.high
      }
      if (low[entry]! < 0) continue
      const at = rowsOf.row(bounds[low[entry]!]!, bounds[high[entry]!]!, weak)
      if (one < 0) one = at
      else other = at
    }
    misfits[cell] = fits ? 0 : 1
    row[cell] = one
    otherRow[cell] = other < 0 ? one : other
  }
  const scalesOf = (
    all: readonly Prediction[],
    index: Int32Array,
    from: number,
    to: number,
    within: ScaleRange,
  ): ScaleRange | null => {
    for (let i = from; i < to; i++) if (all[index[i]!]!.live) return within
    return scalesBetween(all, index, from, to, windows, within)
  }
  judge(0, null)
  let cell = 1
  for (const hypothesis of hypotheses) {
    rowsOf.nextHypothesis()
    for (const { low, high } of hypothesis.cells) {
      const weak = hypothesis.mode === 'weak'
      judge(cell++, weak ? { low: low / nominalBatteryVolts, high: high / nominalBatteryVolts } : null)
    }
  }
  return { table, fitLow, fitHigh, misfits, row, otherRow, logs: rowsOf.logs, peaks: rowsOf.peaks }
}

/** Makes rows of likelihoods, a new one only where none of the last few will do. */
class RowMaker {
  readonly logs: Float64Array[] = []
  readonly peaks: number[] = []
  private readonly ends: (readonly [Prediction, Prediction] | null)[] = []
  private readonly same: number
  private recent: number[] = []
  private readonly good: number[] = []
  private flatRow = -1

  constructor(
    private readonly reading: Reading,
    private readonly scope: Parameters<typeof likelihoodOf>[2],
    private readonly range: ScaleRange,
  ) {
    const { percent, floor } = accuracyOf(reading)
    const size = typeof reading.value === 'number' ? Math.abs(reading.value) : 0
    this.same = (0.02 * ((percent / 100) * size + floor)) / 2
  }

  nextHypothesis() {
    if (this.good.length === 0) this.good.push(...this.logs.keys())
    this.recent = []
  }

  flat(weak: ScaleRange | null): number {
    if (weak) return this.make(null, weak)
    return this.flatRow < 0 ? (this.flatRow = this.make(null, null)) : this.flatRow
  }

  row(a: Prediction, b: Prediction, weak: ScaleRange | null): number {
    if (weak) return this.make([a, b], weak)
    for (const at of this.good) if (this.alike(at, a, b)) return at
    for (const at of this.recent) if (this.alike(at, a, b)) return at
    const at = this.make([a, b], null)
    this.recent.push(at)
    if (this.recent.length > 3) this.recent.shift()
    return at
  }

  private alike(at: number, a: Prediction, b: Prediction): boolean {
    const ends = this.ends[at]
    return !!ends && this.near(ends[0], a) && this.near(ends[1], b)
  }

  private near(x: Prediction, y: Prediction): boolean {
    if (x === y) return true
    const { same } = this
    // Ohms run over many decades and the meter tells parts of what it shows.
    const slack = this.reading.kind === 'ohms' ? same + 1e-4 * Math.abs(x.fixed) : same
    return (
      Math.abs(x.battery - y.battery) <= slack &&
      Math.abs(x.fixed - y.fixed) <= slack &&
      Math.abs(x.spread - y.spread) <= slack &&
      x.live === y.live
    )
  }

  private make(ends: readonly [Prediction, Prediction] | null, weak: ScaleRange | null): number {
    const { low, high } = weak ?? this.range
    const likelihood = likelihoodOf(this.reading, ends, this.scope)
    const logs = new Float64Array(batterySteps)
    let peak = -Infinity
    const still = !ends || (ends[0].battery === 0 && ends[1].battery === 0)
    for (let i = 0; i < batterySteps; i++) {
      logs[i] =
        still && i > 0 ? logs[0]! : Math.log(likelihood(low + ((i + 0.5) / batterySteps) * (high - low)))
      peak = Math.max(peak, logs[i]!)
    }
    this.ends.push(ends)
    this.peaks.push(peak)
    return this.logs.push(logs) - 1
  }
}
