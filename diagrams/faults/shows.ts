import type { Base } from '../solver/base'
import { elementVolts, furthestMove, voltsAt, voltsBetween, type Case, type Settled } from '../solver/case'
import { noAlteration } from '../solver/alteration'
import { Case as FaultCase } from '../solver/case'
import { inputSees, loadWorks } from '../solver/operating-point'
import type { Study } from '../solver/study'

/** What a vehicle shows in one driving condition: volts at every point, loads that work, what inputs see. */
export interface Show {
  volts: Float64Array | null
  works: boolean[]
  sees: string[]
  base: Base | null
  /** Every load and input is further than this from where it changes, volts. */
  margin: number
}

export function goodShow(studies: readonly Study[]): Show[] {
  return studies.map((study) => {
    const given = new FaultCase(study, noAlteration)
    const settled = given.settle(0)
    return settled ? showOf(given, settled) : { volts: null, works: [], sees: [], base: null, margin: 0 }
  })
}

function showOf(given: Case, settled: Settled): Show {
  const { network } = given.study
  const points = pointUnknowns(given.study)
  return {
    volts: Float64Array.from(points, (unknown) => voltsAt(settled, unknown)),
    works: network.loads.map((_, i) => loadWorks(given, settled, i)),
    sees: network.inputs.map((_, i) => inputSees(given, settled, i)),
    base: settled.located.base,
    margin: Math.min(
      ...network.loads.map(({ branch, worksFromVolts }) =>
        Math.abs(Math.abs(elementVolts(given, settled, branch)) - worksFromVolts),
      ),
      ...network.inputs.map(({ inner, innerGround, threshold }) =>
        Math.abs(voltsBetween(settled, inner, innerGround) - threshold),
      ),
    ),
  }
}

const unknownsByNetwork = new WeakMap<object, Int32Array>()

function pointUnknowns(study: Study): Int32Array {
  const { network } = study
  let found = unknownsByNetwork.get(network)
  if (!found) {
    found = Int32Array.from([...network.unknownOf.values()].filter((u) => u >= 0))
    unknownsByNetwork.set(network, found)
  }
  return found
}

/** Under this a move is no show, near or not, volts. */
const quietVolts = 0.3

/** A weak battery moves everything; a load judged by its own element, less than its terminals stand over, has to be looked at. */
function isPlain(given: Case, { located }: Settled): boolean {
  return (
    !given.alteration.weak &&
    given.alteration.forced.idle.size === 0 &&
    given.study.network.loads.every(({ branch }) => branch !== located.branch)
  )
}

/**
 * By how much a fault shows: the largest move of a point against chassis in any driving condition,
 * volts; Infinity when a load or an input changes, or the circuit no longer comes to rest. Stops
 * looking once `enoughVolts` is passed.
 */
export function showsBy(
  cases: readonly Case[],
  good: readonly Show[],
  severity: number,
  enoughVolts: number,
): number {
  let most = 0
  // Backwards: with the controls moved more is going on than at rest.
  for (let c = cases.length - 1; c >= 0; c--) {
    const given = cases[c]!
    const before = good[c]!
    if (!before.volts) continue
    const settled = given.settle(severity)
    if (!settled) return Infinity
    // Where nothing near a limit moves and no point moves by enough, there is nothing to look at one by one.
    if (settled.located.base === before.base && isPlain(given, settled)) {
      const furthest = furthestMove(settled)
      if (2 * furthest < before.margin && furthest <= quietVolts) {
        most = Math.max(most, furthest)
        continue
      }
    }
    const points = pointUnknowns(given.study)
    for (let i = 0; i < points.length; i++)
      most = Math.max(most, Math.abs(voltsAt(settled, points[i]!) - before.volts[i]!))
    const { network } = given.study
    for (let i = 0; i < network.loads.length; i++)
      if (loadWorks(given, settled, i) !== before.works[i]) return Infinity
    for (let i = 0; i < network.inputs.length; i++)
      if (inputSees(given, settled, i) !== before.sees[i]) return Infinity
    if (most > enoughVolts) return most
  }
  return most
}
