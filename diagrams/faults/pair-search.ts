import type { Reading } from '../document/reading-schema'
import { fitsAll, weighReadings, type Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import { logSum } from './log-sum'
import { BoxModel, comesToRest, halvesOf, type PairBox, type PairWork } from './pair-box'
import { candidatePairs, type CandidatePair } from './pair-candidates'
import type { PairMember, WeightOf } from './pair-member'
import { PairSolver } from './pair-solver'
import type { ReportEvidence } from './report-evidence'
import { noFaultPrior } from './priors'

/** Of vehicles with one fault in a circuit, about one in fifty has another that has nothing to do with it (a guess). */
export const secondFaultShare = 0.02

/** A stretch of severities of a pair that explains all readings. */
export interface FittingBox extends PairBox {
  /** ln of the probability of the pair, these severities and the readings. */
  log: number
}

export interface PairSearch {
  solver: PairSolver
  /** Likeliest first; empty when no pair explains the readings. */
  boxes: FittingBox[]
  /** ln of the probability of the readings and of there being two faults. */
  logEvidence: number
}

/** Readings times branches times corners that the search may solve, about: well under a second. */
const work = 6_000_000
const mostPairs = 500
const leastPairs = 40

/**
 * Pairs of faults that explain every reading, each within its limits, one battery behind them all.
 *
 * Every pair begins as one box, all severities of both. A box that cannot give the readings is dropped, which
 * is sound, since a reading lies between those of the box's corners; one that can is halved until it is as
 * fine as the meter. Bounded by the number of boxes, the likelier pairs before the others.
 */
export function searchPairs(
  model: FaultModel,
  evidence: Evidence,
  readings: readonly Reading[],
  weightOf: WeightOf,
  told: ReportEvidence | null = null,
): PairSearch {
  const solver = new PairSolver(model)
  const boxWork = 4 * Math.max(1, readings.length) * model.network.branches.length
  const most = Math.round(Math.min(mostPairs, Math.max(leastPairs, work / 2 / boxWork)))
  let left = Math.round(Math.max(4 * leastPairs, work / boxWork))
  const candidates = candidatePairs(model, evidence, readings, weightOf, most)
  let open = candidates.flatMap((pair) => wholeBoxes(solver, pair, (member) => reportedOf(member, told)))
  const found: FittingBox[] = []
  while (open.length > 0) {
    const boxes = new BoxModel(solver, open)
    const weighed = weighReadings(boxes, readings)
    left -= open.length
    const fitting = open.flatMap((box, b): FittingBox[] => {
      const cell = weighed.cells[b]![0]!
      return fitsAll(weighed, cell, readings) ? [{ ...box, log: box.logPrior + cell.logLikelihood }] : []
    })
    fitting.sort((x, y) => y.log - x.log)
    open = []
    for (const box of fitting) {
      const halves = left >= open.length + 2 ? halvesOf(solver, box, readings) : null
      if (halves) open.push(...halves)
      else if (comesToRest(solver, box, readings)) found.push(box)
    }
  }
  found.sort((x, y) => y.log - x.log)
  return { solver, boxes: found, logEvidence: logSum(found.map((box) => box.log)) }
}

function wholeBoxes(
  solver: PairSolver,
  { a, b }: CandidatePair,
  reported: (member: PairMember) => number,
): PairBox[] {
  // What has no severity, or hardly any, is held; a weak battery cannot be.
  const [held, swept] = b.mode === 'weak' || spread(a) <= spread(b) ? [a, b] : [b, a]
  const [first, second] = held.mode === 'weak' ? [swept, held] : [held, swept]
  const sets = solver.blownSets(first, second)
  const odds = (1 - noFaultPrior) * secondFaultShare * 2 * a.share * b.share
  return sets.map((blown) => {
    const pair: PairWork = { held: first, swept: second, blown, corners: new Map(), predictions: new Map() }
    return {
      pair,
      held: [first.low, first.high],
      swept: [second.low, second.high],
      logPrior: Math.log(odds / sets.length) + Math.max(reported(a), reported(b)),
    }
  })
}

/** ln of the probability of what was told before anything was measured: the severity that suits it best. */
function reportedOf({ hypotheses }: PairMember, told: ReportEvidence | null): number {
  if (!told) return 0
  if (hypotheses.length === 0) return told.good
  return Math.max(...hypotheses.flatMap((h) => [...told.cells[h]!]))
}

const spread = ({ low, high }: PairMember) => (low > 0 ? high / low : 1)
