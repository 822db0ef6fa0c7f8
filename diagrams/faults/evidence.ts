import type { Reading } from '../document/reading-schema'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { FaultModel } from './fault-model'
import type { Cell } from './hypothesis'
import { likelihoodOf, type LikelihoodAt } from './likelihood'
import { goodCell, type CellPrediction } from './prediction-table'
import { overlap, scalesThatFit, windowsOf } from './tolerance-rule'

/** What all readings say of one cell. */
export interface CellEvidence {
  /** Battery scales that fit each reading; null where none does. Same order as the readings. */
  fits: (ScaleRange | null)[]
  /** ln of the probability of the readings, the battery averaged over where it may stand. */
  logLikelihood: number
}

export interface Evidence {
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
      const used = readings.flatMap((reading, r) =>
        reading.condition.charging === charging && !skip.has(r)
          ? [likelihoodOf(reading, predictions[r]!, scope)]
          : [],
      )
      if (used.length === 0) continue
      const misfits = fits.reduce((count, fit, r) => count + Number(fit === null && !skip.has(r)), 0)
      const range = weak
        ? { low: cell.low / 12.6, high: cell.high / 12.6 }
        : charging
          ? chargingRange
          : restingRange
      // What two readings contradict needs no fine look at the battery.
      logLikelihood += logAverage(used, range, misfits > 1 ? 5 : 21)
    }
    return { fits, logLikelihood }
  }
  return {
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

/** The one rule: can this cell give all readings, one and the same battery behind them? `without` is left out. */
export function fitsAll(
  evidence: CellEvidence,
  readings: readonly Reading[],
  included: (index: number) => boolean = () => true,
): boolean {
  let resting: ScaleRange | null = { low: -Infinity, high: Infinity }
  let charging: ScaleRange | null = { low: -Infinity, high: Infinity }
  for (let r = 0; r < readings.length; r++) {
    if (!included(r)) continue
    const fit = evidence.fits[r]!
    if (!fit) return false
    if (readings[r]!.condition.charging) charging = overlap(charging, fit)
    else resting = overlap(resting, fit)
    if (!resting || !charging) return false
  }
  return true
}
