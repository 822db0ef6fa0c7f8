import { alterationKey, noAlteration, type Alteration } from '../solver/alteration'
import { Case, type Settled } from '../solver/case'
import { stateKey, type States, type Study } from '../solver/study'
import { chargingRange, restingRange, weakRange, type ScaleRange } from './battery-range'
import type { Cell, Hypothesis } from './hypothesis'
import { eager, isCertain, reluctant } from './reluctance'

/** The good circuit as a hypothesis with one cell. */
export const goodCell: Cell = { low: 0, high: 0, share: 1 }

/** One network whose reading bounds a cell: a fault at one severity, its parts held in one state. */
export interface Bound {
  given: Case
  severity: number
  states: States
}

/**
 * In one condition: in which states the parts may be at the ends of every cell. Cells are numbered
 * through: 0 is the good circuit, then each hypothesis's cells in order. Each cell has an entry per
 * state, from `first[cell]` to `first[cell + 1] − 1`.
 */
export interface CellStates {
  bounds: readonly Bound[]
  first: Int32Array
  /** Per entry: key of its state. */
  state: readonly string[]
  /** Per entry: the bounds of the cell in that state, `bound[firstBound[entry]]` … `bound[firstBound[entry + 1] − 1]`. */
  firstBound: Int32Array
  bound: Int32Array
  /** Per entry: the bounds at the cell's two ends where one of them settles in that state as drawn, else −1. */
  low: Int32Array
  high: Int32Array
  /** Per cell: 1 where the circuit may not come to rest, which foretells nothing. Such a cell has no entries. */
  restless: Uint8Array
}

export function cellStates(study: Study, hypotheses: readonly Hypothesis[]): CellStates {
  const draft = new Draft()
  let given = new Case(study, noAlteration)
  let key = alterationKey(noAlteration)
  const caseOf = (alteration: Alteration): Case => {
    const next = alterationKey(alteration)
    // Neighbours in the list often change the same branch.
    if (next !== key) given = new Case(study, alteration)
    key = next
    return given
  }
  draft.add(given, [goodCell])
  for (const hypothesis of hypotheses)
    draft.add(caseOf(hypothesis.alteration(study.network)), hypothesis.cells)
  return draft.finish()
}

class Draft {
  private readonly bounds: Bound[] = []
  private readonly first: number[] = [0]
  private readonly state: string[] = []
  private readonly low: number[] = []
  private readonly high: number[] = []
  private readonly firstBound: number[] = [0]
  private readonly bound: number[] = []
  private readonly restless: number[] = []

  add(given: Case, cells: readonly Cell[]) {
    const range = rangeOf(given)
    const ends = new Map<number, EndStates | null>()
    const endOf = (severity: number) => {
      let found = ends.get(severity)
      if (found === undefined) ends.set(severity, (found = settleEnd(given, severity, range)))
      return found
    }
    const known = new Map<States, Map<number, number>>()
    const boundOf = (states: States, severity: number): number => {
      let bySeverity = known.get(states)
      if (!bySeverity) known.set(states, (bySeverity = new Map()))
      let found = bySeverity.get(severity)
      if (found === undefined) {
        found = this.bounds.push({ given, severity, states }) - 1
        bySeverity.set(severity, found)
      }
      return found
    }
    for (const { low, high } of cells) {
      const a = endOf(low)
      const b = endOf(high)
      this.restless.push(a && b ? 0 : 1)
      if (a && b)
        for (const states of a === b ? a.possible : new Set([...a.possible, ...b.possible])) {
          this.state.push(stateKey(states))
          const [from, to] = [boundOf(states, low), boundOf(states, high)]
          this.bound.push(from)
          if (to !== from) this.bound.push(to)
          this.firstBound.push(this.bound.length)
          const settles = states === a.settled || states === b.settled
          this.low.push(settles ? from : -1)
          this.high.push(settles ? to : -1)
        }
      this.first.push(this.state.length)
    }
  }

  finish(): CellStates {
    return {
      bounds: this.bounds,
      first: Int32Array.from(this.first),
      state: this.state,
      low: Int32Array.from(this.low),
      high: Int32Array.from(this.high),
      firstBound: Int32Array.from(this.firstBound),
      bound: Int32Array.from(this.bound),
      restless: Uint8Array.from(this.restless),
    }
  }
}

function rangeOf({ alteration, study }: Case): ScaleRange {
  return alteration.weak ? weakRange : study.condition.charging ? chargingRange : restingRange
}

interface EndStates {
  settled: States
  /** Every state the parts may be in, given battery and tolerances; the one they settle in comes first. */
  possible: ReadonlySet<States>
}

/** Parts that may be in either state are tried in every combination; with more of them nothing is foretold. */
const mostDoubtful = 4

function settleEnd(given: Case, severity: number, range: ScaleRange): EndStates | null {
  const settled = given.settle(severity)
  if (!settled) return null
  const possible = new Set([settled.states])
  const certain: EndStates = { settled: settled.states, possible }
  const { relays, modules, diodes } = given.study.network
  if (relays.length + modules.length + diodes.length === 0) return certain
  if (given.passed.every((state: Settled) => isCertain(given, state))) return certain
  const found: States[] = [settled.states]
  for (const [scale, reluctance] of [
    [range.high, eager],
    [range.low, reluctant],
  ] as const) {
    const other = given.settle(severity, scale, reluctance)
    if (!other) return null
    found.push(other.states)
    possible.add(other.states)
  }
  const mixtures = combinations(found)
  if (mixtures === null) return null
  for (const held of mixtures) {
    const solved = given.settleDiodes(given.study.same(held), severity, given.scaleFor(severity))
    if (solved) possible.add(solved.states)
  }
  return { settled: settled.states, possible }
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
