import type { Condition } from '../document/condition-schema'
import type { FaultModel } from '../faults/fault-model'
import type { Hypothesis } from '../faults/hypothesis'
import { leadBelowOhms, leadFuseAmps } from '../solver/added-lead'
import { alterationKey, noAlteration } from '../solver/alteration'
import { branchAmps, Case } from '../solver/case'
import { blowsAtRatingTimes } from '../solver/constants'
import { Study } from '../solver/study'
import type { Particle } from './particles'

/**
 * Whether what a condition puts in stays within its fuse, and the circuit's fuses within theirs, in the
 * good circuit and with any of the suspects at fault. `model` is that of the network with the leads in.
 * A lead that one likely fault would blow tells nothing that can be read from a meter.
 */
export function leadsAreSafe(
  model: FaultModel,
  condition: Condition,
  particles: readonly Particle[],
): boolean {
  const { network } = model
  const study = new Study(network, condition)
  const leads = condition.added.flatMap((lead, i) =>
    lead.ohms < leadBelowOhms ? [network.branchIndex.get(`added:${i}`)!] : [],
  )
  let given = new Case(study, noAlteration)
  let key = alterationKey(noAlteration)
  const isSafe = (severity: number): boolean => {
    const settled = given.settle(severity)
    if (!settled) return false
    return (
      leads.every((branch) => Math.abs(branchAmps(given, settled, branch)) <= leadFuseAmps) &&
      network.fuses.every(
        ({ branch, amps }) => Math.abs(branchAmps(given, settled, branch)) <= blowsAtRatingTimes * amps,
      )
    )
  }
  if (!isSafe(0)) return false
  const asked = new Set<Hypothesis>()
  return particles.every(({ hypothesis, severity }) => {
    if (!hypothesis) return true
    const alteration = hypothesis.alteration(network)
    if (alterationKey(alteration) !== key) given = new Case(study, alteration)
    key = alterationKey(alteration)
    const severities = [severity]
    if (!asked.has(hypothesis)) severities.push(hypothesis.cells[0]!.low, hypothesis.cells.at(-1)!.high)
    asked.add(hypothesis)
    return severities.every(isSafe)
  })
}
