import type { CodeEvidence } from './code-evidence'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { Hypothesis } from './hypothesis'
import type { Odds } from './odds-schema'
import { modeWeight, noFaultPrior } from './priors'
import type { PriorKind } from './request'

/** Probabilities of no fault and of every cell; they sum to 1. */
export interface Posterior {
  noFault: number
  /** Same order as the model's hypotheses and their cells. */
  cells: Float64Array[]
  /** ln of the probability of the readings under all hypotheses together. */
  logEvidence: number
}

export function posteriorOf(
  model: FaultModel,
  evidence: Evidence,
  kind: PriorKind,
  codes: CodeEvidence | null = null,
  odds?: Odds,
): Posterior {
  const logPrior = logPriors(model, kind, odds)
  const logNoFault = model.hypotheses.length === 0 ? 0 : Math.log(noFaultPrior)
  const logs = model.hypotheses.map((hypothesis, h) =>
    Float64Array.from(
      hypothesis.cells,
      (_, c) => logPrior[h]![c]! + evidence.logs[h]![c]! + (codes ? codes.cells[h]![c]! : 0),
    ),
  )
  const good = logNoFault + evidence.goodLog + (codes?.good ?? 0) + shareTolerances(model, evidence, logs)
  let most = good
  for (const list of logs) for (const log of list) most = Math.max(most, log)
  let sum = Math.exp(good - most)
  for (const list of logs) for (const log of list) sum += Math.exp(log - most)
  return {
    noFault: Math.exp(good - most) / sum,
    cells: logs.map((list) => list.map((log) => Math.exp(log - most) / sum)),
    logEvidence: most + Math.log(sum),
  }
}

/** Cells whose odds are worked out with shared tolerances: so many of the likeliest, within so many nats of the best. */
const looked = 40
const within = 7

/**
 * Adds to the likeliest cells what shared tolerances make of their readings, against the good circuit with every
 * reading where it should be; the others, which hold little, stay as they are. Gives what is to be added to the good
 * circuit's own.
 */
function shareTolerances(model: FaultModel, evidence: Evidence, logs: readonly Float64Array[]): number {
  if (!evidence.shared) return 0
  const plain = evidence.shared(-1, 0, true)
  let best = -Infinity
  for (const list of logs) for (const log of list) best = Math.max(best, log)
  const likeliest: { h: number; c: number; log: number }[] = []
  logs.forEach((list, h) => {
    // A weak battery scales every reading by itself.
    if (model.hypotheses[h]!.mode === 'weak') return
    list.forEach((log, c) => {
      if (log > best - within) likeliest.push({ h, c, log })
    })
  })
  likeliest.sort((x, y) => y.log - x.log)
  for (const { h, c } of likeliest.slice(0, looked)) logs[h]![c]! += evidence.shared(h, c) - plain
  return evidence.shared(-1, 0) - plain
}

/** ln of each cell's share of the 0.9 that faults have before any reading. */
function logPriors(model: FaultModel, kind: PriorKind, odds?: Odds): Float64Array[] {
  // A mode's odds are spread over those of its severities that show.
  const shareOf = new Map<string, number>()
  const key = (h: Hypothesis) => `${h.site} ${h.mode} ${h.other} ${h.wire}`
  for (const hypothesis of model.hypotheses)
    for (const cell of hypothesis.cells)
      shareOf.set(key(hypothesis), (shareOf.get(key(hypothesis)) ?? 0) + cell.share)
  const weights = model.hypotheses.map((hypothesis) => {
    const all = shareOf.get(key(hypothesis))!
    const weight = modeWeight(model.circuit, hypothesis.site, hypothesis.mode, kind, odds) * hypothesis.part
    return Float64Array.from(hypothesis.cells, (cell) => (all > 0 ? (weight * cell.share) / all : 0))
  })
  let total = 0
  for (const list of weights) for (const weight of list) total += weight
  // Where no fault shows enough to count, no fault holds all.
  const share = total > 0 ? (1 - noFaultPrior) / total : 0
  return weights.map((list) => list.map((weight) => Math.log(share * weight)))
}

/** Probability per site, for every site of the model. */
export function siteProbabilities(model: FaultModel, posterior: Posterior): Map<string, number> {
  const found = new Map<string, number>()
  model.hypotheses.forEach((hypothesis, h) => {
    let sum = found.get(hypothesis.site) ?? 0
    for (const probability of posterior.cells[h]!) sum += probability
    found.set(hypothesis.site, sum)
  })
  return found
}
