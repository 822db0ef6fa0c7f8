import type { Probe } from '../document/reading-schema'
import type { CellStates } from './cell-states'
import { Predictor, type Prediction } from './prediction'

/** What one cell foretells for one reading. */
export interface CellPrediction {
  /**
   * Both ends of the cell in every state its parts may be in, by state: within one state a reading
   * lies between the ends. Null when the circuit may not come to rest, which foretells nothing.
   */
  bounds: ReadonlyMap<string, readonly Prediction[]> | null
  /**
   * The two ends in the state they settle in; twice when the ends settle differently, once for each
   * state. Null when one does not settle.
   */
  ends: readonly (readonly [Prediction, Prediction])[] | null
}

/** Predictions of one reading for the good circuit and every cell of every hypothesis, cells numbered through. */
export class PredictionTable {
  private made: CellPrediction[][] | undefined

  constructor(
    readonly states: CellStates,
    /** Same order as the bounds of `states`. */
    readonly bounds: readonly Prediction[],
    /** Cells of each hypothesis. */
    private readonly counts: readonly number[],
  ) {}

  get good(): CellPrediction {
    return this.cell(0)
  }

  /** Same order as the hypotheses and their cells. */
  get cells(): CellPrediction[][] {
    let next = 1
    return (this.made ??= this.counts.map((count) => Array.from({ length: count }, () => this.cell(next++))))
  }

  private cell(cell: number): CellPrediction {
    const { first, state, firstBound, bound, low, high, restless } = this.states
    if (restless[cell]) return { bounds: null, ends: null }
    const bounds = new Map<string, readonly Prediction[]>()
    const ends: [Prediction, Prediction][] = []
    for (let entry = first[cell]!; entry < first[cell + 1]!; entry++) {
      const own = bound.subarray(firstBound[entry], firstBound[entry + 1])
      bounds.set(
        state[entry]!,
        Array.from(own, (index) => this.bounds[index]!),
      )
      if (low[entry]! >= 0) ends.push([this.bounds[low[entry]!]!, this.bounds[high[entry]!]!])
    }
    return { bounds, ends }
  }
}

/** A table of cells that were predicted one by one: the good circuit's, then each hypothesis's. */
export function tableOf(
  good: CellPrediction,
  cells: readonly (readonly CellPrediction[])[],
): PredictionTable {
  const all = [good, ...cells.flat()]
  const bounds: Prediction[] = []
  const first = [0]
  const state: string[] = []
  const firstBound = [0]
  const bound: number[] = []
  const low: number[] = []
  const high: number[] = []
  for (const cell of all) {
    for (const [key, own] of cell.bounds ?? []) {
      state.push(key)
      for (const prediction of own) bound.push(bounds.push(prediction) - 1)
      firstBound.push(bound.length)
      const ends = cell.ends?.find(([end]) => own.includes(end))
      low.push(ends ? firstBound.at(-2)! + own.indexOf(ends[0]) : -1)
      high.push(ends ? firstBound.at(-2)! + own.indexOf(ends[1]) : -1)
    }
    first.push(state.length)
  }
  return new PredictionTable(
    {
      bounds: [],
      first: Int32Array.from(first),
      state,
      firstBound: Int32Array.from(firstBound),
      bound: Int32Array.from(bound),
      low: Int32Array.from(low),
      high: Int32Array.from(high),
      restless: Uint8Array.from(all, (cell) => (cell.bounds === null ? 1 : 0)),
    },
    bounds,
    cells.map((list) => list.length),
  )
}

export function predictAll(states: CellStates, counts: readonly number[], probe: Probe): PredictionTable {
  const predictor = new Predictor(probe)
  const bounds: Prediction[] = []
  for (let i = 0; i < states.bounds.length; i++) {
    const { given, severity, states: held } = states.bounds[i]!
    bounds.push(predictor.predict(given, given.solve(held, severity, scaleFor(given, severity))))
    // A fault's volts everywhere are wanted for as long as its severities are gone through, no longer.
    if (states.bounds[i + 1]?.given !== given) given.releaseUnit()
  }
  return new PredictionTable(states, bounds, counts)
}

/** Predictions are linear in the battery, so a weak one is predicted for 12.6 V and scaled. */
function scaleFor(given: Bound['given'], severity: number): number {
  return given.alteration.weak ? 1 : given.scaleFor(severity)
}
type Bound = CellStates['bounds'][number]
