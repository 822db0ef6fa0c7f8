import type { Answer, ModeAnswer, Outcome, SiteAnswer } from './faults/answer'
import { clearances, type Clearance } from './faults/clearance'
import { codeEvidence } from './faults/code-evidence'
import type { Evidence } from './faults/evidence'
import { weighReadings } from './faults/weighed-readings'
import { explain } from './faults/explain'
import { faultModelSteps } from './faults/fault-model'
import { modeAnswers } from './faults/mode-answers'
import { misfitOf } from './faults/misfit'
import { weighMoved } from './faults/moved-evidence'
import { swings } from './faults/moved-reading'
import { comesAndGoesSentence, sayMoved } from './faults/moved-sentence'
import { twoFaultsIn } from './faults/pair-odds'
import { posteriorOf, siteProbabilities, type Posterior } from './faults/posterior'
import { allReports } from './faults/report-evidence'
import { judgeReadings } from './faults/reading-sentence'
import type { EvaluationRequest } from './faults/request'
import { explainedByLikeliest, symptomEvidence } from './faults/symptom-evidence'
import { symptomSentence } from './faults/symptom-sentence'
import { runToEnd, type Step, type Steps } from './faults/steps'
import { modeWeight } from './faults/priors'
import { sitesOf, type Mode } from './document/sites'
import { nextReadings } from './next-readings'
import { planSteps, type Plan, worthwhileBits } from './planner/plan-next'
import { answerTwoFaults } from './two-faults'

/** Fewer readings than this never speak of two faults. */
const leastForTwo = 2
/** One site, or one group that cannot be told apart, is located when it holds this much. */
const locatedFrom = 0.95

/**
 * The evaluator: from a circuit and what was read to where the fault lies, what is proved good, and
 * what to read next. The request comes from `openEvaluationRequest`, so it is sound.
 */
export function evaluate(request: EvaluationRequest): Answer {
  return runToEnd(evaluateSteps(request))
}

/** The same in portions, so that a thread may look for something newer in between. */
export function* evaluateSteps(request: EvaluationRequest): Steps<Answer> {
  const { circuit, readings, codes, priors, odds, symptoms = [] } = request
  const model = yield* faultModelSteps(circuit)
  const scope = { network: model.network }
  const comesAndGoes = readings.some((reading) => swings(reading, scope))
  const weigh = comesAndGoes ? weighMoved : weighReadings
  for (const [done, reading] of readings.entries()) {
    yield { stage: 'readings', done, of: readings.length }
    // What is foretold for a reading is kept, so that weighing them together finds it there.
    model.table(reading)
  }
  const weighed: Step = { stage: 'readings', done: readings.length, of: readings.length }
  const full = weigh(model, readings)
  yield weighed
  const complaint = symptomEvidence(model, symptoms)
  const told = allReports([codeEvidence(model, codes), complaint])
  const posteriorFor = (evidence: Evidence) => posteriorOf(model, evidence, priors, told, odds)
  const misfit = misfitOf(model, readings, full, posteriorFor, weigh)
  if (misfit && !comesAndGoes && !misfit.contradicts && readings.length >= leastForTwo) {
    const weightOf = (site: string, mode: Mode) => modeWeight(circuit, site, mode, priors, odds)
    const pairs = yield* twoFaultsIn(model, readings, full, misfit, weightOf, told)
    if (pairs) return yield* answerTwoFaults(pairs, full, readings)
  }
  const aside = misfit?.reading ?? null
  const evidence = aside === null ? full : weigh(model, readings, new Set([aside]))
  const posterior = posteriorFor(evidence)
  const kept = aside === null ? readings : readings.filter((_, r) => r !== aside)
  yield weighed
  const plan = yield* planSteps(model, posterior, kept)

  const sites = sitesOf(circuit).map((site) => site.id)
  const probabilities = siteProbabilities(model, posterior)
  const modes = modeAnswers(model, posterior, evidence)
  const cleared = clearances(model, full, readings, sites)
  const judged = sayMoved(circuit, readings, judgeReadings(model, readings, full), scope)
  const located = locatedGroup(probabilities, plan.inseparable)
  const outcome = outcomeOf(
    posterior,
    plan,
    located,
    aside !== null,
    judged.every((reading) => reading.agrees) && readings.length > 0,
  )
  const siteAnswers = sites
    .map((site) =>
      siteAnswer(
        site,
        modes.get(site) ?? [],
        probabilities.get(site) ?? 0,
        cleared.get(site)!,
        outcome,
        located,
      ),
    )
    .toSorted((a, b) => b.probability - a.probability)
  const answer = explain(model.circuit, readings, {
    outcome,
    noFault: posterior.noFault,
    sites: siteAnswers,
    readings: judged,
    ...(outcome === 'cannot-be' && aside !== null ? { reading: readings[aside]!.id } : {}),
    next: nextReadings(circuit, plan),
    inseparable: plan.inseparable,
    ...(comesAndGoes ? { comesAndGoes } : {}),
  })
  const explains = complaint ? explainedByLikeliest(complaint, posterior) : ''
  const says = [
    answer.says,
    comesAndGoesSentence(circuit, readings, scope),
    symptomSentence(circuit, symptoms, outcome, explains),
  ]
  return { ...answer, says: says.filter(Boolean).join(' ') }
}

function outcomeOf(
  posterior: Posterior,
  plan: Plan,
  located: readonly string[] | null,
  misfit: boolean,
  nothingWrong: boolean,
): Outcome {
  if (misfit) return 'cannot-be'
  if (located) return 'located'
  if (posterior.noFault >= locatedFrom) return 'no-fault'
  return nothingWrong && plan.mostBits < worthwhileBits ? 'no-fault' : 'narrowed'
}

/** The site or inseparable group that holds 0.95, or null. */
function locatedGroup(
  probabilities: ReadonlyMap<string, number>,
  inseparable: readonly string[][],
): string[] | null {
  const groups = [...[...probabilities.keys()].map((site) => [site]), ...inseparable]
  return (
    groups.find(
      (group) => group.reduce((sum, site) => sum + (probabilities.get(site) ?? 0), 0) >= locatedFrom,
    ) ?? null
  )
}

function siteAnswer(
  site: string,
  modes: ModeAnswer[],
  probability: number,
  clearance: Clearance,
  outcome: Outcome,
  located: readonly string[] | null,
): Omit<SiteAnswer, 'says'> {
  const good = clearance.cleared && outcome !== 'cannot-be'
  const faulty = outcome === 'located' && located!.includes(site)
  return {
    site,
    verdict: faulty ? 'faulty' : good ? 'proved-good' : 'in-question',
    firm: good && clearance.firm,
    clearedBy: good ? clearance.clearedBy : [],
    probability,
    modes,
  }
}
