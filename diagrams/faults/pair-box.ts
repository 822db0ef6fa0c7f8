import type { Reading } from '../document/reading-schema'
import { noAlteration } from '../solver/alteration'
import { stateKey, type States } from '../solver/study'
import { FaultModel } from './fault-model'
import type { Hypothesis } from './hypothesis'
import type { Prediction } from './prediction'
import type { CellPrediction, PredictionTable } from './prediction-table'
import type { PairCorner, PairSolver, SolvedPair } from './pair-solver'
import { accuracyOf, windowsOf } from './tolerance-rule'

export type Range = readonly [low: number, high: number]

/** A pair over a stretch of severities of either fault. */
export interface PairBox {
  pair: PairWork
  held: Range
  swept: Range
  /** ln of its odds before any reading. */
  logPrior: number
}

/** A pair being weighed, with what was solved of it so far. */
export interface PairWork extends SolvedPair {
  corners: Map<string, PairCorner | null>
  predictions: Map<string, Prediction>
}

/**
 * Boxes as a fault model, each one hypothesis of one cell, so that readings are weighed by the same rules as
 * for single faults. With everything else fixed a reading is monotone in the severity of either fault, hence
 * within a box it lies between the readings at the box's corners.
 */
export class BoxModel extends FaultModel {
  constructor(
    private readonly solver: PairSolver,
    private readonly boxes: readonly PairBox[],
  ) {
    super(solver.model.circuit, { network: solver.model.network, hypotheses: boxes.map(hypothesisOf) })
  }

  override table(reading: Reading): PredictionTable {
    return {
      good: this.solver.model.table(reading).good,
      cells: this.boxes.map((box) => [predictBox(this.solver, box, reading)]),
    }
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

function predictBox(solver: PairSolver, box: PairBox, reading: Reading): CellPrediction {
  const corners = cornersOf(solver, box, reading)
  if (corners === null) return { bounds: null, ends: null }
  const states = new Map<string, States>()
  const settled = new Map<string, States>()
  for (const { corner } of corners) {
    for (const [key, state] of corner.possible) states.set(key, state)
    settled.set(stateKey(corner.settled), corner.settled)
  }
  const bounds = new Map<string, Prediction[]>()
  for (const [key, state] of states)
    bounds.set(
      key,
      corners.map(({ corner, name }) =>
        kept(box.pair.predictions, `${reading.id} ${name} ${key}`, () =>
          solver.predict(corner, state, reading),
        ),
      ),
    )
  return { bounds, ends: [...settled.keys()].map((key) => endsOf(bounds.get(key)!)) }
}

/** The two corners furthest apart. */
function endsOf(predictions: readonly Prediction[]): [Prediction, Prediction] {
  let [least, most] = [predictions[0]!, predictions[0]!]
  for (const prediction of predictions) {
    if (plain(prediction) < plain(least)) least = prediction
    if (plain(prediction) > plain(most)) most = prediction
  }
  return [least, most]
}

const plain = (prediction: Prediction) => prediction.battery + prediction.fixed

/** Null when the circuit does not come to rest at one of them. */
function cornersOf(
  solver: PairSolver,
  { pair, held, swept }: PairBox,
  reading: Reading,
): { corner: PairCorner; name: string }[] | null {
  const found: { corner: PairCorner; name: string }[] = []
  for (const heldAt of ends(held))
    for (const sweptAt of ends(swept)) {
      const name = `${heldAt} ${sweptAt}`
      const corner = kept(pair.corners, `${solver.conditionName(reading)} ${name}`, () =>
        solver.corner(pair, heldAt, sweptAt, reading),
      )
      if (!corner) return null
      found.push({ corner, name })
    }
  return found
}

/** A circuit that keeps switching itself foretells nothing, and explains nothing either. */
export function comesToRest(solver: PairSolver, box: PairBox, readings: readonly Reading[]): boolean {
  return readings.every((reading) => cornersOf(solver, box, reading) !== null)
}

const ends = ([low, high]: Range): number[] => (low === high ? [low] : [low, high])

function kept<V>(map: Map<string, V>, key: string, find: () => V): V {
  let found = map.get(key)
  if (found === undefined) map.set(key, (found = find()))
  return found
}

/** Nearer to each other than this many standard deviations, the ends of a box are as good as one. */
const fineDeviations = 3
/** Severities nearer than this to each other are not told apart. */
const finePart = 1.03

/** Halves a box across the fault whose severity moves some reading the most; null when that is too little to matter. */
export function halvesOf(solver: PairSolver, box: PairBox, readings: readonly Reading[]): PairBox[] | null {
  const effects = { held: 0, swept: 0 }
  for (const reading of readings) {
    const corners = cornersOf(solver, box, reading)
    if (corners === null) continue
    const state = corners[0]!.corner.settled
    const key = stateKey(state)
    const of = corners.map(({ corner, name }) =>
      kept(box.pair.predictions, `${reading.id} ${name} ${key}`, () =>
        solver.predict(corner, state, reading),
      ),
    )
    const effect = (x: number, y: number) =>
      stateKey(corners[x]!.corner.settled) === stateKey(corners[y]!.corner.settled)
        ? deviationsBetween(solver, reading, of[x]!, of[y]!)
        : 2 * fineDeviations
    const last = of.length - 1
    // Corners run through the swept fault's ends first.
    const step = box.swept[0] === box.swept[1] ? 1 : 2
    if (step === 2) effects.swept = Math.max(effects.swept, effect(0, 1), effect(last - 1, last))
    if (box.held[0] !== box.held[1])
      effects.held = Math.max(effects.held, effect(0, step), effect(last - step, last))
  }
  const which = effects.held > effects.swept ? 'held' : 'swept'
  if (effects[which] < fineDeviations) return null
  const [low, high] = box[which]
  if (low <= 0 || high / low < finePart) return null
  const middle = box.pair[which].mode === 'weak' ? (low + high) / 2 : Math.sqrt(low * high)
  const logPrior = box.logPrior - Math.LN2
  return [
    { ...box, [which]: [low, middle] as const, logPrior },
    { ...box, [which]: [middle, high] as const, logPrior },
  ]
}

function deviationsBetween(solver: PairSolver, reading: Reading, one: Prediction, other: Prediction): number {
  const [low, high] = [Math.min(plain(one), plain(other)), Math.max(plain(one), plain(other))]
  if (typeof reading.value === 'number') {
    const { percent, floor } = accuracyOf(reading)
    const limit = (percent / 100) * Math.abs(reading.value) + floor
    return (high - low) / Math.sqrt((limit / 2) ** 2 + ((one.spread + other.spread) / 2) ** 2)
  }
  // What only has to lie within a window is as good anywhere in it.
  const inside = windowsOf(reading, { network: solver.model.network }).some(
    (window) => low >= window.low && high <= window.high,
  )
  return inside ? 0 : 2 * fineDeviations
}
