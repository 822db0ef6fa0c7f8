import type { Reading } from './document/reading-schema'
import { sitesOf } from './document/sites'
import type { Answer } from './faults/answer'
import type { Evidence } from './faults/evidence'
import { explain, type UnexplainedAnswer } from './faults/explain'
import { pairAnswers, pairModes, pairOdds, siteShares } from './faults/pair-answer'
import type { PairSearch } from './faults/pair-search'
import { judgeReadings } from './faults/reading-sentence'
import type { Steps } from './faults/steps'
import { nextReadings } from './next-readings'
import { planPairs } from './planner/plan-pairs'

/** A place, or a group that cannot be told apart, is one of the two when it holds this much. */
const faultyFrom = 0.95

/**
 * The answer while two faults stand together: every probability is a site's own over the pairs, and nothing is
 * proved good, since that rests on there being one fault.
 */
export function* answerTwoFaults(
  search: PairSearch,
  evidence: Evidence,
  readings: readonly Reading[],
): Steps<Answer> {
  const { model } = search.solver
  const { circuit } = model
  const plan = yield* planPairs(search, readings)
  const pairs = pairOdds(search)
  const shares = siteShares(pairs)
  const groups = [...[...shares.keys()].map((site) => [site]), ...plan.inseparable]
  const faulty = new Set(
    groups
      .filter((group) => group.reduce((sum, site) => sum + (shares.get(site) ?? 0), 0) >= faultyFrom)
      .flat(),
  )
  const sites = sitesOf(circuit)
    .map(({ id }): UnexplainedAnswer['sites'][number] => ({
      site: id,
      verdict: faulty.has(id) ? 'faulty' : 'in-question',
      firm: false,
      clearedBy: [],
      probability: Math.min(1, shares.get(id) ?? 0),
      modes: shares.has(id) ? pairModes(id, search) : [],
    }))
    .toSorted((a, b) => b.probability - a.probability)
  return explain(circuit, readings, {
    outcome: 'two-faults',
    noFault: 0,
    sites,
    readings: judgeReadings(model, readings, evidence),
    pairs: pairAnswers(model, pairs, evidence, readings),
    next: nextReadings(circuit, plan),
    inseparable: plan.inseparable,
  })
}
