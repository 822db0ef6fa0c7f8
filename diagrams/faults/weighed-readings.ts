import { conditionKey } from '../document/condition'
import type { Reading } from '../document/reading-schema'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { CellEvidence, Evidence, Included } from './evidence'
import type { FaultModel } from './fault-model'
import { batterySteps, type JudgedReading } from './judged-reading'
import { sharedLog } from './shared-tolerances'
import { accuracyOf, anyState, type Fits } from './tolerance-rule'

/** Cells this far below the likeliest, in nats of likelihood, get no fine look at the battery. */
const coarseFrom = 30

/** Judges every cell against every reading. `skip` holds indices of readings that the odds leave out. */
export function weighReadings(
  model: FaultModel,
  readings: readonly Reading[],
  skip: ReadonlySet<number> = new Set(),
): Evidence {
  return new WeighedReadings(model, readings, skip)
}

/** All readings judged against every cell, cells numbered through. */
class WeighedReadings implements Evidence {
  readonly conditions: number[]
  readonly goodLog: number
  readonly logs: readonly Float64Array[]
  private readonly judged: readonly JudgedReading[]
  private readonly used: readonly number[]
  private readonly firstCell: Int32Array
  private made: CellEvidence[][] | undefined

  constructor(
    private readonly model: FaultModel,
    private readonly readings: readonly Reading[],
    skip: ReadonlySet<number>,
  ) {
    const keys = readings.map((reading) => conditionKey(model.circuit, reading.condition))
    this.conditions = keys.map((key) => keys.indexOf(key))
    this.judged = readings.map((reading) => model.judged(reading))
    this.firstCell = model.firstCell
    this.used = [...readings.keys()].filter((r) => !skip.has(r))
    const flat = this.weigh(this.used, model.cellCount)
    this.goodLog = flat[0]!
    this.logs = model.hypotheses.map(({ cells }, h) =>
      flat.subarray(this.firstCell[h], this.firstCell[h]! + cells.length),
    )
  }

  fits(hypothesis: number, cell: number, included?: Included): boolean {
    return this.fitsAt(hypothesis < 0 ? 0 : this.firstCell[hypothesis]! + cell, included)
  }

  shared(hypothesis: number, cell: number, still = false): number {
    const at = hypothesis < 0 ? 0 : this.firstCell[hypothesis]! + cell
    let log = 0
    for (const charging of [false, true]) {
      const used = this.used.filter((r) => this.readings[r]!.condition.charging === charging)
      if (used.length < 2) continue
      log += sharedLog(
        used.map((r) => this.readings[r]!),
        used.map((r) => this.judged[r]!),
        at,
        charging ? chargingRange : restingRange,
        still,
      )
    }
    return log
  }

  /** By least squares over readings that the cell explains, each taken as straight between the cell's ends, at any battery. */
  within(hypothesis: number, cell: number): number {
    const at = this.firstCell[hypothesis]! + cell
    const explained = this.used.flatMap((r) => this.straightIn(r, at) ?? [])
    let [weights, sum] = [0, 0]
    for (let i = 0; i < batterySteps; i++) {
      let [along, square, off] = [0, 0, 0]
      for (const { ends, range, value, variance } of explained) {
        const scale = range.low + ((i + 0.5) / batterySteps) * (range.high - range.low)
        const from = scale * ends[0].battery + ends[0].fixed
        const slope = scale * ends[1].battery + ends[1].fixed - from
        along += (slope * (value - from)) / variance
        square += slope ** 2 / variance
        off += (value - from) ** 2 / variance
      }
      if (square === 0) return 0.5
      const part = Math.min(1, Math.max(0, along / square))
      const weight = Math.exp(-(off - 2 * part * along + part ** 2 * square) / 2)
      weights += weight
      sum += weight * part
    }
    return weights > 0 ? sum / weights : 0.5
  }

  private straightIn(r: number, cell: number) {
    const reading = this.readings[r]!
    const { table, misfits } = this.judged[r]!
    const { first, low, high } = table.states
    const { value } = reading
    if (typeof value !== 'number' || misfits[cell] === 1) return null
    let entry = first[cell]!
    while (entry < first[cell + 1]! && low[entry]! < 0) entry++
    if (entry === first[cell + 1]) return null
    const ends = [table.bounds[low[entry]!]!, table.bounds[high[entry]!]!] as const
    const { percent, floor } = accuracyOf(reading)
    const variance =
      (((percent / 100) * Math.abs(value) + floor) / 2) ** 2 + ((ends[0].spread + ends[1].spread) / 2) ** 2
    return { ends, value, variance, range: reading.condition.charging ? chargingRange : restingRange }
  }

  get good(): CellEvidence {
    return { fits: this.fitsOf(0, false), logLikelihood: this.goodLog }
  }

  get cells(): CellEvidence[][] {
    return (this.made ??= this.model.hypotheses.map(({ cells, mode }, h) =>
      cells.map((_, c) => ({
        fits: this.fitsOf(this.firstCell[h]! + c, mode === 'weak'),
        logLikelihood: this.logs[h]![c]!,
      })),
    ))
  }

  private fitsAt(cell: number, included?: Included): boolean {
    const { judged, readings, conditions } = this
    for (let r = 0; r < judged.length; r++)
      if (judged[r]!.misfits[cell] === 1 && (!included || included(r))) return false
    // Each reading fits for itself: now one battery and one state behind those of each condition.
    let [restLow, restHigh, chargeLow, chargeHigh] = [-Infinity, Infinity, -Infinity, Infinity]
    for (let first = 0; first < judged.length; first++) {
      if (conditions[first] !== first) continue
      if (!this.together(cell, first, included)) return false
      if (readings[first]!.condition.charging) {
        chargeLow = Math.max(chargeLow, togetherLow)
        chargeHigh = Math.min(chargeHigh, togetherHigh)
      } else {
        restLow = Math.max(restLow, togetherLow)
        restHigh = Math.min(restHigh, togetherHigh)
      }
    }
    return restLow <= restHigh + 1e-12 && chargeLow <= chargeHigh + 1e-12
  }

  /** Battery scales at which some one state fits all readings of a condition, into `togetherLow` and `togetherHigh`. */
  private together(cell: number, first: number, included?: Included): boolean {
    const { judged, conditions } = this
    togetherLow = Infinity
    togetherHigh = -Infinity
    const { states } = judged[first]!.table
    if (states.restless[cell]) {
      togetherLow = -Infinity
      togetherHigh = Infinity
      return true
    }
    let asked = false
    for (let entry = states.first[cell]!; entry < states.first[cell + 1]!; entry++) {
      let [low, high] = [-Infinity, Infinity]
      for (let r = first; r < judged.length; r++) {
        if (conditions[r] !== first || (included && !included(r))) continue
        asked = true
        const other = judged[r]!.table.states
        const at = other === states ? entry : sameState(other, cell, states.state[entry]!)
        low = at < 0 ? Infinity : Math.max(low, judged[r]!.fitLow[at]!)
        high = at < 0 ? -Infinity : Math.min(high, judged[r]!.fitHigh[at]!)
      }
      if (low > high + 1e-12) continue
      togetherLow = Math.min(togetherLow, low)
      togetherHigh = Math.max(togetherHigh, high)
    }
    if (!asked) {
      togetherLow = -Infinity
      togetherHigh = Infinity
    }
    return togetherLow <= togetherHigh + 1e-12
  }

  /** ln of the probability of the given readings for every cell, the battery averaged over where it may stand. */
  private weigh(used: readonly number[], cells: number): Float64Array {
    const flat = new Float64Array(cells)
    if (used.length === 0) return flat
    const { judged } = this
    let best = -Infinity
    for (let cell = 0; cell < cells; cell++) {
      let most = 0
      for (const r of used)
        most += Math.max(
          judged[r]!.peaks[judged[r]!.row[cell]!]!,
          judged[r]!.peaks[judged[r]!.otherRow[cell]!]!,
        )
      flat[cell] = most
      if (most > best) best = most
    }
    for (const charging of [false, true]) {
      const group = used.filter((r) => this.readings[r]!.condition.charging === charging)
      if (group.length > 0) this.refine(flat, group, best - coarseFrom)
    }
    return flat
  }

  /** Puts the average over the battery in place of the most, where that matters. */
  private refine(flat: Float64Array, group: readonly number[], above: number) {
    const { judged } = this
    const sum = new Float64Array(batterySteps)
    const averageOf = (cell: number, which: 'row' | 'otherRow'): number => {
      sum.fill(0)
      for (const r of group) {
        const logs = judged[r]!.logs[judged[r]![which][cell]!]!
        for (let i = 0; i < batterySteps; i++) sum[i]! += logs[i]!
      }
      return logAverage(sum)
    }
    const peakOf = (cell: number): number => {
      let most = 0
      for (const r of group)
        most += Math.max(
          judged[r]!.peaks[judged[r]!.row[cell]!]!,
          judged[r]!.peaks[judged[r]!.otherRow[cell]!]!,
        )
      return most
    }
    let before = -1
    let gain = 0
    for (let cell = 0; cell < flat.length; cell++) {
      if (flat[cell]! < above) continue
      // Neighbours often foretell the same, or what the good circuit does.
      const alike = [before, 0].find(
        (other) =>
          other >= 0 &&
          other < cell &&
          group.every(
            (r) =>
              judged[r]!.row[cell] === judged[r]!.row[other] &&
              judged[r]!.otherRow[cell] === judged[r]!.otherRow[other],
          ),
      )
      if (alike === undefined || alike !== before) {
        const one = averageOf(cell, 'row')
        const twice = group.some((r) => judged[r]!.row[cell] !== judged[r]!.otherRow[cell])
        // A cell whose ends settle differently is half in one state and half in the other.
        gain = (twice ? logMean(one, averageOf(cell, 'otherRow')) : one) - peakOf(cell)
        before = cell
      }
      flat[cell]! += gain
    }
  }

  private fitsOf(cell: number, weak: boolean): Fits[] {
    return this.judged.map(({ table: { states }, fitLow, fitHigh }, r) => {
      const range: ScaleRange = weak
        ? weakRange
        : this.readings[r]!.condition.charging
          ? chargingRange
          : restingRange
      if (states.restless[cell]) return new Map([[anyState, range]])
      const fits = new Map<string, ScaleRange>()
      for (let entry = states.first[cell]!; entry < states.first[cell + 1]!; entry++)
        if (fitLow[entry]! <= fitHigh[entry]! + 1e-12)
          fits.set(states.state[entry]!, { low: fitLow[entry]!, high: fitHigh[entry]! })
      return fits
    })
  }
}

let togetherLow = 0
let togetherHigh = 0

function sameState(states: JudgedReading['table']['states'], cell: number, key: string): number {
  for (let entry = states.first[cell]!; entry < states.first[cell + 1]!; entry++)
    if (states.state[entry] === key) return entry
  return -1
}

function logAverage(logs: Float64Array): number {
  let most = -Infinity
  for (const log of logs) if (log > most) most = log
  let sum = 0
  for (const log of logs) sum += Math.exp(log - most)
  return most + Math.log(sum / logs.length)
}

function logMean(a: number, b: number): number {
  const most = Math.max(a, b)
  return most + Math.log((Math.exp(a - most) + Math.exp(b - most)) / 2)
}
