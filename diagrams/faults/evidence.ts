import { conditionKey } from '../document/condition'
import type { Reading } from '../document/reading-schema'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { FaultModel } from './fault-model'
import type { Cell } from './hypothesis'
import { likelihoodOf, type LikelihoodAt } from './likelihood'
import { goodCell, type CellPrediction } from './prediction-table'
import { hull, overlap, scalesThatFit, windowsOf, type Fits } from './tolerance-rule'

/** What all readings say of one cell. */
export interface CellEvidence {
  /** Battery scales that fit each reading, by state; empty where none does. Same order as the readings. */
  fits: Fits[]
  /** ln of the probability of the readings, the battery averaged over where it may stand. */
  logLikelihood: number
}

export interface Evidence {
  /** Readings with the same number were taken in the same condition: the parts were in one state. */
  conditions: number[]
  good: CellEvidence
  /** Same order as the model's hypotheses and their cells. */
  cells: CellEvidence[][]
}

/** Judges every cell against every reading. `skip` holds indices of readings that the odds leave out. */
export function weighReadings(
  model: FaultModel,
  readings: readonly Reading[],
  skip: ReadonlySet<number> = new Set(),
): Evidence {
  const scope = { network: model.network }
  const tables = readings.map((reading) => model.table(reading))
  const windows = readings.map((reading) => windowsOf(reading, scope))
  const judge = (cell: Cell, predictions: CellPrediction[], weak: boolean): CellEvidence => {
    const fits = readings.map((reading, r) =>
      scalesThatFit(
        predictions[r]!,
        windows[r]!,
        weak ? weakRange : reading.condition.charging ? chargingRange : restingRange,
      ),
    )
    let logLikelihood = 0
    for (const charging of [false, true]) {
      const used = [...readings.keys()].filter(
        (r) => readings[r]!.condition.charging === charging && !skip.has(r),
      )
      if (used.length === 0) continue
      const misfits = used.filter((r) => fits[r]!.size === 0).length
      const range = weak
        ? { low: cell.low / 12.6, high: cell.high / 12.6 }
        : charging
          ? chargingRange
          : restingRange
      // What two readings contradict needs no fine look at the battery.
      const steps = misfits > 1 ? 5 : 21
      const inState = (variant: number) =>
        logAverage(
          used.map((r) => {
            const ends = predictions[r]!.ends
            return likelihoodOf(readings[r]!, ends && (ends[variant] ?? ends[0]!), scope)
          }),
          range,
          steps,
        )
      // A cell whose ends settle differently is half in one state and half in the other.
      const twice = used.some((r) => (predictions[r]!.ends?.length ?? 1) > 1)
      logLikelihood += twice ? logMean(inState(0), inState(1)) : inState(0)
    }
    return { fits, logLikelihood }
  }
  const keys = readings.map((reading) => conditionKey(model.circuit, reading.condition))
  return {
    conditions: keys.map((key) => keys.indexOf(key)),
    good: judge(
      goodCell,
      tables.map((table) => table.good),
      false,
    ),
    cells: model.hypotheses.map((hypothesis, h) => {
      const weak = hypothesis.mode === 'weak'
      return hypothesis.cells.map((cell, c) =>
        judge(
          cell,
          tables.map((table) => table.cells[h]![c]!),
          weak,
        ),
      )
    }),
  }
}

/** ln of the product of the likelihoods, averaged over the battery's scale. */
function logAverage(likelihoods: readonly LikelihoodAt[], range: ScaleRange, steps: number): number {
  let most = -Infinity
  const logs: number[] = []
  for (let i = 0; i < steps; i++) {
    const scale = range.low + ((i + 0.5) / steps) * (range.high - range.low)
    let log = 0
    for (const likelihood of likelihoods) log += Math.log(likelihood(scale))
    logs.push(log)
    most = Math.max(most, log)
  }
  let sum = 0
  for (const log of logs) sum += Math.exp(log - most)
  return most + Math.log(sum / steps)
}

function logMean(a: number, b: number): number {
  const most = Math.max(a, b)
  return most + Math.log((Math.exp(a - most) + Math.exp(b - most)) / 2)
}

/**
 * The one rule: can this cell give all included readings, one and the same battery behind them, and
 * its parts in one and the same state throughout each condition?
 */
export function fitsAll(
  { conditions }: Evidence,
  cell: CellEvidence,
  readings: readonly Reading[],
  included: (index: number) => boolean = () => true,
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
