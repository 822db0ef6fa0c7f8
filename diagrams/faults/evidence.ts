import type { Fits } from './tolerance-rule'

/** What all readings say of one cell. */
export interface CellEvidence {
  /** Battery scales that fit each reading, by state; empty where none does. Same order as the readings. */
  fits: Fits[]
  /** ln of the probability of the readings, the battery averaged over where it may stand. */
  logLikelihood: number
}

/** Which readings a question is asked of. */
export type Included = (index: number) => boolean

export interface Evidence {
  /** Readings with the same number were taken in the same condition: the parts were in one state. */
  readonly conditions: number[]
  readonly good: CellEvidence
  /** Same order as the model's hypotheses and their cells. */
  readonly cells: CellEvidence[][]
  /** ln of the probability of the readings, of the good circuit and of every cell. */
  readonly goodLog: number
  readonly logs: readonly Float64Array[]
  /**
   * The one rule: can this cell give all included readings, one and the same battery behind them, and its parts in
   * one and the same state throughout each condition? Hypothesis −1 is the good circuit.
   */
  fits(hypothesis: number, cell: number, included?: Included): boolean
  /**
   * What is to be added to a cell's log because parts off the drawing are the same ones in every reading: worked out
   * for the few cells that hold the odds. With `still`, as if every reading lay where the cell foretells it.
   */
  shared?(hypothesis: number, cell: number, still?: boolean): number
  /** How far between a cell's low and high severity the readings lie, 0 to 1, on its logarithmic scale. */
  within?(hypothesis: number, cell: number): number
}
