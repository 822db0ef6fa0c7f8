import type { Probe } from '../document/reading-schema'
import { alterationKey, noAlteration, type Alteration } from '../solver/alteration'
import { buildNetwork } from '../solver/build-network'
import { Case, type Settled } from '../solver/case'
import type { Network } from '../solver/network'
import { stateKey, Study, type States } from '../solver/study'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { Cell, Hypothesis } from './hypothesis'
import { predict, type Prediction } from './prediction'
import { eager, isCertain, reluctant } from './reluctance'

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

/** The good circuit as a hypothesis with one cell. */
export const goodCell: Cell = { low: 0, high: 0, share: 1 }

/** Predictions of one reading for the good circuit and every cell of every hypothesis. */
export interface PredictionTable {
  good: CellPrediction
  /** Same order as the hypotheses and their cells. */
  cells: CellPrediction[][]
}

export function predictAll(study: Study, hypotheses: readonly Hypothesis[], probe: Probe): PredictionTable {
  let given = new Case(study, noAlteration)
  let key = alterationKey(noAlteration)
  const caseOf = (alteration: Alteration): Case => {
    const next = alterationKey(alteration)
    // Neighbours in the list often change the same branch.
    if (next !== key) given = new Case(study, alteration)
    key = next
    return given
  }
  return {
    good: predictCells(given, [goodCell], probe)[0]!,
    cells: hypotheses.map((hypothesis) =>
      predictCells(caseOf(hypothesis.alteration(study.network)), hypothesis.cells, probe),
    ),
  }
}

function predictCells(given: Case, cells: readonly Cell[], probe: Probe): CellPrediction[] {
  const range = given.alteration.weak
    ? weakRange
    : given.study.condition.charging
      ? chargingRange
      : restingRange
  const ends = new Map<number, EndStates | null>()
  const endOf = (severity: number) => {
    let found = ends.get(severity)
    if (found === undefined) ends.set(severity, (found = settleEnd(given, severity, range)))
    return found
  }
  const known = new Map<string, Prediction>()
  const predicted = (states: States, severity: number): Prediction => {
    const key = `${severity} ${stateKey(states)}`
    let found = known.get(key)
    if (!found)
      known.set(
        key,
        (found = predict(given, given.solve(states, severity, scaleFor(given, severity)), probe)),
      )
    return found
  }
  return cells.map(({ low, high }) => {
    const [a, b] = [endOf(low), endOf(high)]
    if (!a || !b) return { bounds: null, ends: null }
    const states = new Map([...a.possible, ...b.possible])
    const settled = new Map([
      [stateKey(a.settled.states), a.settled.states],
      [stateKey(b.settled.states), b.settled.states],
    ])
    return {
      bounds: new Map(
        [...states].map(([key, state]) => [
          key,
          high === low ? [predicted(state, low)] : [predicted(state, low), predicted(state, high)],
        ]),
      ),
      ends: [...settled.values()].map((state) => [predicted(state, low), predicted(state, high)] as const),
    }
  })
}

/** Predictions are linear in the battery, so a weak one is predicted for 12.6 V and scaled. */
function scaleFor(given: Case, severity: number): number {
  return given.alteration.weak ? 1 : given.scaleFor(severity)
}

interface EndStates {
  settled: Settled
  /** Every state the parts may be in, given battery and tolerances. */
  possible: Map<string, States>
}

/** Parts that may be in either state are tried in every combination; with more of them nothing is foretold. */
const mostDoubtful = 4

function settleEnd(given: Case, severity: number, range: ScaleRange): EndStates | null {
  const settled = given.settle(severity)
  if (!settled) return null
  const possible = new Map([[stateKey(settled.states), settled.states]])
  const { relays, modules, diodes } = given.study.network
  if (relays.length + modules.length + diodes.length === 0) return { settled, possible }
  if (given.passed.every((state) => isCertain(given, state))) return { settled, possible }
  const found: States[] = [settled.states]
  for (const [scale, reluctance] of [
    [range.high, eager],
    [range.low, reluctant],
  ] as const) {
    const other = given.settle(severity, scale, reluctance)
    if (!other) return null
    found.push(other.states)
    possible.set(stateKey(other.states), other.states)
  }
  const mixtures = combinations(found)
  if (mixtures === null) return null
  for (const held of mixtures) {
    const solved = given.settleDiodes(held, severity, given.scaleFor(severity))
    if (solved) possible.set(stateKey(solved.states), solved.states)
  }
  return { settled, possible }
}

/** Every mixture of relays and modules that the given states disagree on; null when there are too many. */
function combinations(states: readonly States[]): States[] | null {
  const [first] = states as [States]
  let all: States[] = [first]
  let doubtful = 0
  for (const kind of ['relays', 'modules'] as const)
    first[kind].forEach((on, i) => {
      if (states.every((state) => state[kind][i] === on)) return
      doubtful++
      if (doubtful > mostDoubtful) return
      all = all.flatMap((state) => [state, { ...state, [kind]: state[kind].with(i, !on) }])
    })
  return doubtful > mostDoubtful ? null : all
}

/** A study for a probe's condition, with the leads it adds. */
export function studyFor(network: Network, probe: Probe): Study {
  const { added } = probe.condition
  return new Study(added.length === 0 ? network : buildNetwork(network.circuit, added), probe.condition)
}
