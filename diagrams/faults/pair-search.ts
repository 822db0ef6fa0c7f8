import type { Reading } from '../document/reading-schema'
import type { Evidence } from './evidence'
import { weighReadings } from './weighed-readings'
import type { FaultModel } from './fault-model'
import { logSum } from './log-sum'
import { BoxModel, comesToRest, mayGive, wholeBox, type PairBox } from './pair-box'
import { halvesOf, spreadOf } from './pair-halves'
import { askedReadings, type AskedReading } from './pair-corner'
import { candidatePairs, hiddenCandidates, type CandidatePair } from './pair-candidates'
import type { PairMember, WeightOf } from './pair-member'
import { PairSolver } from './pair-solver'
import type { ReportEvidence } from './report-evidence'
import type { Step, Steps } from './steps'
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

/** Branches that may be gone through: well under a second. The search for pairs has the first part to itself. */
const work = 6_000_000
const searchPart = 0.5
const mostPairs = 3000
/** Boxes this far below the best, in nats, whatever halving may bring, are left as they are. */
const negligible = 8

/**
 * Pairs of faults that explain every reading, each within its limits, one battery behind them all.
 *
 * Every pair begins as one box, all severities of both. A box that cannot give some reading is dropped, which
 * is sound, since a reading lies between those of the box's corners; one that can give all is halved until it is
 * as fine as the meter. Bounded by the work done, not by the clock.
 */
export function* searchPairs(
  model: FaultModel,
  evidence: Evidence,
  readings: readonly Reading[],
  weightOf: WeightOf,
  told: ReportEvidence | null = null,
): Steps<PairSearch> {
  const solver = new PairSolver(model)
  const asked = askedReadings(model, evidence, readings)
  const prior = (member: PairMember) => reportedOf(member, told)
  const fitting = (candidates: readonly CandidatePair[]) =>
    boxesThatFit(solver, candidates, readings, asked, prior)
  let boxes = yield* fitting(candidatePairs(model, evidence, readings, weightOf, mostPairs))
  if (boxes.length === 0) {
    solver.spent = 0
    boxes = yield* fitting(hiddenCandidates(model, weightOf, readings.length))
  }
  boxes.sort((x, y) => y.log - x.log)
  return { solver, boxes, logEvidence: logSum(boxes.map((box) => box.log)) }
}

function* boxesThatFit(
  solver: PairSolver,
  candidates: readonly CandidatePair[],
  readings: readonly Reading[],
  asked: readonly AskedReading[],
  prior: (member: PairMember) => number,
): Steps<FittingBox[]> {
  let open: PairBox[] = []
  for (const [c, candidate] of candidates.entries()) {
    if (solver.spent > searchPart * work) break
    if (c % portion === 0) yield stepOf(solver)
    for (const box of wholeBoxes(solver, candidate, prior)) if (mayGive(solver, box, asked)) open.push(box)
  }
  const found: FittingBox[] = []
  let weighed = weigh(solver, open, readings, asked)
  // Level by level: a coarse box says too little of how likely it is to be left behind for a fine one.
  while (weighed.length > 0) {
    yield stepOf(solver)
    open = []
    const best = Math.max(...found.map((box) => box.log), ...weighed.map((box) => box.log))
    const spread = weighed.map((box) => ({ box, by: spreadOf(solver, box, asked) }))
    spread.sort((x, y) => y.box.log + y.by.gain - x.box.log - x.by.gain)
    for (const [b, { box, by }] of spread.entries()) {
      if (b % portion === portion - 1) yield stepOf(solver)
      const matters = box.log + by.gain > best - negligible
      const halves = matters && solver.spent < work ? halvesOf(box, by) : null
      if (halves) open.push(...halves.filter((half) => mayGive(solver, half, asked)))
      else if (comesToRest(solver, box, asked)) found.push(box)
    }
    weighed = weigh(solver, open, readings, asked)
  }
  return found
}

/** Pairs or boxes between two looks at whether something newer is asked. */
const portion = 16

const stepOf = ({ spent }: PairSolver): Step => ({
  stage: 'readings',
  done: Math.min(spent, work),
  of: work,
})

/** The boxes that give all readings together, with how well. */
function weigh(
  solver: PairSolver,
  boxes: readonly PairBox[],
  readings: readonly Reading[],
  asked: readonly AskedReading[],
): FittingBox[] {
  if (boxes.length === 0) return []
  const weighed = weighReadings(new BoxModel(solver, boxes, asked), readings)
  return boxes.flatMap((box, b) =>
    weighed.fits(b, 0) ? [{ ...box, log: box.logPrior + weighed.logs[b]![0]! }] : [],
  )
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
  const logPrior = Math.log(odds / sets.length) + Math.max(reported(a), reported(b))
  return sets.map((blown) => wholeBox({ held: first, swept: second, blown }, logPrior))
}

/** ln of the probability of what was told before anything was measured: the severity that suits it best. */
function reportedOf({ hypotheses }: PairMember, told: ReportEvidence | null): number {
  if (!told) return 0
  if (hypotheses.length === 0) return told.good
  return Math.max(...hypotheses.flatMap((h) => [...told.cells[h]!]))
}

const spread = ({ low, high }: PairMember) => (low > 0 ? high / low : 1)
