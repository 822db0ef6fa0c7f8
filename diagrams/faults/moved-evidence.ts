import { conditionKey } from '../document/condition'
import type { Reading } from '../document/reading-schema'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { CellEvidence, Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { Hypothesis } from './hypothesis'
import { plainEvidence } from './plain-evidence'
import { absentCells, type Absent } from './moved-absent'
import { movedLikelihoods } from './moved-likelihood'
import { atEnd, halves, isMoved } from './moved-reading'
import type { CellPrediction, PredictionTable } from './prediction-table'
import { anyState, scalesThatFit, windowsOf, type Fits, type Windows } from './tolerance-rule'

const fitting: Fits = new Map([[anyState, { low: -Infinity, high: Infinity }]])
const misfitting: Fits = new Map()

/**
 * Judges every cell where the fault comes and goes. Each reading was taken with the fault or without it, at any severity
 * it may have, and while the harness was moved the meter may have shown anything between. The one rule is therefore
 * asked of a site as a whole: a reading misfits a site when neither the circuit without the fault nor any fault of
 * that site, at any severity, gives it. That two readings share a battery, or that parts stay in one state, is not
 * used: it would hold for a fault that stays.
 */
export function weighMoved(
  model: FaultModel,
  readings: readonly Reading[],
  skip: ReadonlySet<number> = new Set(),
): Evidence {
  const scope = { network: model.network }
  const tables = readings.map((reading) => model.table(reading))
  const absent = absentCells(model)
  const kept = [...readings.keys()].filter((r) => !skip.has(r))
  const likelihoods = movedLikelihoods(
    model,
    kept.map((r) => readings[r]!),
    kept.map((r) => tables[r]!),
    absent,
  )
  const asked = readings.map((reading) => questionsOf(reading, (each) => windowsOf(each, scope)))
  const bySite = new Map<string, number[]>()
  model.hypotheses.forEach(({ site }, h) => {
    const list = bySite.get(site)
    if (list) list.push(h)
    else bySite.set(site, [h])
  })
  const fitsOf = (own: readonly number[]): Fits[] =>
    readings.map((reading, r) => {
      const shows = (windows: Windows) => showsOf(model.hypotheses, own, absent, tables[r]!, reading, windows)
      return asked[r]!.every(shows) ? fitting : misfitting
    })
  const fitsBySite = new Map([...bySite].map(([site, own]) => [site, fitsOf(own)]))
  const keys = readings.map((reading) => conditionKey(model.circuit, reading.condition))
  return plainEvidence(
    readings,
    keys.map((key) => keys.indexOf(key)),
    { fits: goodFits(readings, tables, asked), logLikelihood: likelihoods.good },
    model.hypotheses.map(({ site, cells }, h) =>
      cells.map(
        (_, c): CellEvidence => ({ fits: fitsBySite.get(site)!, logLikelihood: likelihoods.cells[h]![c]! }),
      ),
    ),
  )
}

/** What must be possible for a reading: its value; moved, each of its figures from above and from below. */
function questionsOf(reading: Reading, windowsFor: (reading: Reading) => Windows): Windows[] {
  if (!isMoved(reading)) return [windowsFor(reading)]
  return [reading, atEnd(reading, 'low'), atEnd(reading, 'high')].flatMap((each) => halves(windowsFor(each)))
}

function showsOf(
  hypotheses: readonly Hypothesis[],
  own: readonly number[],
  absent: readonly Absent[],
  table: PredictionTable,
  reading: Reading,
  windows: Windows,
): boolean {
  const fits = (cell: CellPrediction, weak = false) =>
    scalesThatFit(cell, windows, rangeOf(reading, weak)).size > 0
  if (fits(table.good)) return true
  return own.some((h) => {
    const without = absent[h]!
    return (
      without === 'anything' ||
      table.cells[h]!.some((cell) => fits(cell, hypotheses[h]!.mode === 'weak')) ||
      without.cells.some(([other, c]) => fits(table.cells[other]![c]!))
    )
  })
}

function goodFits(
  readings: readonly Reading[],
  tables: readonly PredictionTable[],
  asked: readonly Windows[][],
): Fits[] {
  return readings.map((reading, r) =>
    asked[r]!.every((windows) => scalesThatFit(tables[r]!.good, windows, rangeOf(reading, false)).size > 0)
      ? fitting
      : misfitting,
  )
}

function rangeOf(reading: Reading, weak: boolean): ScaleRange {
  return weak ? weakRange : reading.condition.charging ? chargingRange : restingRange
}
