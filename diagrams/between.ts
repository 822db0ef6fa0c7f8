import type { Problem } from './document/check-circuit'
import type { Circuit } from './document/circuit-schema'
import { siteName, sitesOf } from './document/sites'
import type { NextOutcome, NextReading } from './faults/answer'
import { codeEvidence } from './faults/code-evidence'
import { weighReadings } from './faults/weighed-readings'
import { faultModelOf } from './faults/fault-model'
import { posteriorOf } from './faults/posterior'
import type { EvaluationRequest } from './faults/request'
import { outcomesOf } from './planner/outcomes'
import { planBetween } from './planner/plan-between'
import { capital, conditionWords, probeWords } from './planner/wording'

/** What would settle between places. */
export interface Between {
  /** Best bits per minute first, as if the fault were at one of the places; empty when nothing tells them apart. */
  readings: NextReading[]
  says: string
}

/**
 * Which readings would settle between two places, or within a group that no ordinary reading tells apart.
 * The request comes from `openEvaluationRequest`.
 */
export function readingsBetween(
  request: EvaluationRequest,
  sites: readonly string[],
): { ok: true; value: Between } | { ok: false; problem: Problem } {
  const { circuit, readings, codes, priors, odds } = request
  const problem = checkSites(circuit, sites)
  if (problem) return { ok: false, problem }
  const model = faultModelOf(circuit)
  const names = sites.map((site) => siteName(circuit, site))
  const silent = sites.find((site) => !model.hypotheses.some((hypothesis) => hypothesis.site === site))
  if (silent !== undefined) {
    const says = `${capital(siteName(circuit, silent))} cannot be at fault in a way that shows, so there is nothing to settle.`
    return { ok: true, value: { readings: [], says } }
  }
  const evidence = weighReadings(model, readings)
  const posterior = posteriorOf(model, evidence, priors, codeEvidence(model, codes), odds)
  const plan = planBetween(model, posterior, readings, sites)
  const found = plan.next.map((planned): NextReading => {
    const outcomes = outcomesOf(planned, plan.particles)
    return {
      ...planned.probe,
      bits: planned.bits,
      minutes: planned.minutes,
      outcomes,
      says: settlingWords(circuit, planned.probe, planned.minutes, outcomes),
    }
  })
  const between = `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`
  const says = found[0]
    ? `Between ${between}: ${found[0].says}`
    : `No reading tells ${between} apart, whatever is opened, pulled or put in. Mend ${names.length === 2 ? 'both' : 'all of them'} in one repair, then prove it.`
  return { ok: true, value: { readings: found, says } }
}

function checkSites(circuit: Circuit, sites: readonly string[]): Problem | null {
  if (new Set(sites).size < 2)
    return { path: 'sites', message: `${sites.length} places, expected two or more different ones` }
  const known = new Set(sitesOf(circuit).map((site) => site.id))
  const index = sites.findIndex((site) => !known.has(site))
  return index < 0 ? null : { path: `sites.${index}`, message: `place "${sites[index]}" does not exist` }
}

/** "C12 cavity 3, dash side. Back-probe volts to chassis. Key on. 12.6 V: wire w4. 0 V: C12 cavity 3. About 3 minutes." */
function settlingWords(
  circuit: Circuit,
  probe: Parameters<typeof probeWords>[1],
  minutes: number,
  outcomes: readonly NextOutcome[],
): string {
  const time = Math.max(1, Math.round(minutes))
  const condition = conditionWords(circuit, probe.condition)
  const leaves = outcomes.map(
    ({ about, leaves }) => `${capital(about)}: ${leaves.map((site) => siteName(circuit, site)).join(' or ')}`,
  )
  return [
    ...probeWords(circuit, probe),
    condition && capital(condition),
    ...leaves,
    `About ${time} ${time === 1 ? 'minute' : 'minutes'}`,
  ]
    .filter(Boolean)
    .map((part) => `${part}.`)
    .join(' ')
}
