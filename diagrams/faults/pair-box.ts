import type { Reading } from '../document/reading-schema'
import { noAlteration } from '../solver/alteration'
import { FaultModel } from './fault-model'
import type { Hypothesis } from './hypothesis'
import { BoxCorner, type AskedReading } from './pair-corner'
import type { PairSolver, SolvedPair } from './pair-solver'
import type { Prediction } from './prediction'
import { tableOf, type CellPrediction, type PredictionTable } from './prediction-table'
import { weakRange } from './battery-range'
import { scalesThatFit } from './tolerance-rule'

export type Range = readonly [low: number, high: number]

/** A pair over a stretch of severities of either fault. */
export interface PairBox {
  pair: SolvedPair
  held: Range
  swept: Range
  /** The ends of the swept fault at the held one's low end, then at its high end; fewer where a stretch is one point. */
  corners: readonly BoxCorner[]
  /** ln of its odds before any reading. */
  logPrior: number
}

/** All severities of both. */
export function wholeBox(pair: SolvedPair, logPrior: number): PairBox {
  const held: Range = [pair.held.low, pair.held.high]
  const swept: Range = [pair.swept.low, pair.swept.high]
  const corners = ends(held).flatMap((h) => ends(swept).map((s) => new BoxCorner(pair, h, s)))
  return { pair, held, swept, corners, logPrior }
}

export const ends = ([low, high]: Range): number[] => (low === high ? [low] : [low, high])

/**
 * Boxes as a fault model, each one hypothesis of one cell, so that readings are weighed by the same rules as
 * for single faults. With everything else fixed a reading is monotone in the severity of either fault, hence
 * within a box it lies between the readings at the box's corners.
 */
export class BoxModel extends FaultModel {
  constructor(
    private readonly solver: PairSolver,
    private readonly boxes: readonly PairBox[],
    private readonly asked: readonly AskedReading[],
  ) {
    super(solver.model.circuit, { network: solver.model.network, hypotheses: boxes.map(hypothesisOf) })
  }

  override table(reading: Reading): PredictionTable {
    const asked = this.asked.find((one) => one.reading === reading)!
    return tableOf(
      this.solver.model.table(reading).good,
      this.boxes.map((box) => [predictBox(this.solver, box, asked)]),
    )
  }
}

function hypothesisOf({ pair, swept }: PairBox): Hypothesis {
  return {
    site: `${pair.held.site} and ${pair.swept.site}`,
    // Only a weak battery is told from the others by those who weigh readings, and it is always the swept one.
    mode: pair.swept.mode,
    other: null,
    wire: null,
    blows: [...pair.blown],
    part: 1,
    cells: [{ low: swept[0], high: swept[1], share: 1 }],
    alteration: () => noAlteration,
  }
}

/** False for a box that cannot give some one reading, whatever else: the readings most likely to refute it come first. */
export function mayGive(solver: PairSolver, box: PairBox, asked: readonly AskedReading[]): boolean {
  const weak = box.pair.swept.mode === 'weak'
  return asked.every(
    (one) => scalesThatFit(predictBox(solver, box, one), one.windows, weak ? weakRange : one.range).size > 0,
  )
}

/** A circuit that keeps switching itself foretells nothing, and explains nothing either. */
export function comesToRest(solver: PairSolver, box: PairBox, asked: readonly AskedReading[]): boolean {
  return asked.every((one) => box.corners.every((corner) => corner.settle(solver, one) !== null))
}

function predictBox(solver: PairSolver, { corners }: PairBox, asked: AskedReading): CellPrediction {
  const bounds = new Map<string, Prediction[]>()
  const settled = new Set<string>()
  for (const corner of corners) {
    const rests = corner.settle(solver, asked)
    if (!rests) return { bounds: null, ends: null }
    for (const [key, states] of rests.possible)
      if (!bounds.has(key))
        bounds.set(
          key,
          corners.map((each) => each.predict(solver, asked, key, states)!),
        )
    settled.add(rests.settledKey)
  }
  for (const predictions of bounds.values())
    if (predictions.some((prediction) => prediction === null)) return { bounds: null, ends: null }
  return { bounds, ends: [...settled].map((key) => furthest(bounds.get(key)!)) }
}

/** The two corners furthest apart. */
function furthest(predictions: readonly Prediction[]): [Prediction, Prediction] {
  let [least, most] = [predictions[0]!, predictions[0]!]
  for (const prediction of predictions) {
    if (plain(prediction) < plain(least)) least = prediction
    if (plain(prediction) > plain(most)) most = prediction
  }
  return [least, most]
}

/** What a prediction comes to at 12.6 V. */
export const plain = (prediction: Prediction) => prediction.battery + prediction.fixed
