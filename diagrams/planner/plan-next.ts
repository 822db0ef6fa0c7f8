import type { Circuit, ControlsSetting } from '../document/circuit-schema'
import type { Reading } from '../document/reading-schema'
import type { FaultModel } from '../faults/fault-model'
import type { Posterior } from '../faults/posterior'
import { runToEnd, type Steps } from '../faults/steps'
import { readingsWithLeads } from './added-leads'
import { groupsAlike } from './alike'
import { candidateReadings, mostConditions, type CandidateSet } from './candidates'
import { chooseNext } from './choose-next'
import { particlesOf, type Particle } from './particles'
import { Scales, type PlannedReading } from './scales'
import { wideReadings } from './wide-readings'

export type { PlannedReading } from './scales'

export interface Plan {
  particles: Particle[]
  /** Best bits per minute first. */
  next: PlannedReading[]
  /** Bits of the best reading by bits alone, whatever it costs. */
  mostBits: number
  /** Sites that no candidate reading tells apart. */
  inseparable: string[][]
}

/** Particles times conditions that one plan weighs, about, and the conditions it always weighs. */
const weighings = 6000
const leastConditions = 12
/** Leads are thought of when this few particles are left: before that, plain readings split better. */
const leadsUpTo = 200
/** A group that holds this much may soon be called the place. */
const groupFrom = 0.5

/**
 * Weighs every candidate reading by the drop in entropy over sites it is expected to bring, divided
 * by its minutes: one step of look-ahead. Never repeats a reading already taken.
 */
export function planNext(model: FaultModel, posterior: Posterior, readings: readonly Reading[]): Plan {
  return runToEnd(planSteps(model, posterior, readings))
}

/** The same in portions, a condition at a time. */
export function* planSteps(
  model: FaultModel,
  posterior: Posterior,
  readings: readonly Reading[],
): Steps<Plan> {
  const { circuit } = model
  const particles = particlesOf(model, posterior)
  const bySite = new Map<string, number>()
  for (const particle of particles)
    bySite.set(particle.site, (bySite.get(particle.site) ?? 0) + particle.weight)
  const suspects = [...bySite.keys()]
    .filter((site) => site !== '')
    .toSorted((a, b) => bySite.get(b)! - bySite.get(a)!)
  const alike = groupsAlike(suspects, bySite)
  const scales = new Scales(model, particles, readings, (bins) => alike.see(bins, particles))
  const present = scales.workplace.condition

  // While much is in question the plain conditions are enough to split it; later every one counts.
  const limit = Math.min(mostConditions, Math.max(leastConditions, Math.round(weighings / particles.length)))
  yield* weighAll(scales, candidateReadings(circuit, suspects, present, { limit }))
  if (particles.length <= leadsUpTo) yield* weighAll(scales, readingsWithLeads(circuit, suspects, present))
  // Where all is read that tells suspects apart, the same leads with the controls moved count as a second look.
  if (scales.found.length === 0 && readings.length > 0)
    yield* weighAll(
      scales,
      candidateReadings(circuit, suspects, present, { deadControls: movedControls(circuit) }),
    )
  // Before places are called one group, the search is made wider round them.
  const massOf = (group: readonly string[]) => group.reduce((sum, site) => sum + bySite.get(site)!, 0)
  const heavy = alike.groups().filter((group) => massOf(group) >= groupFrom)
  for (const group of heavy) yield* weighAll(scales, wideReadings(circuit, group))
  return {
    particles,
    next: chooseNext(circuit, scales.found),
    mostBits: Math.max(0, ...scales.found.map(({ bits }) => bits)),
    inseparable: alike.groups(),
  }
}

function* weighAll(scales: Scales, sets: readonly CandidateSet[]): Steps<void> {
  for (const [done, set] of sets.entries()) {
    yield { stage: 'planning', done, of: sets.length }
    scales.weigh(set)
  }
}

/** The combination of controls furthest from rest. */
function movedControls(circuit: Circuit): ControlsSetting {
  return Object.fromEntries(
    circuit.controls.map((control) => [
      control.id,
      control.positions.findLast((p) => p !== control.rest) ?? control.rest,
    ]),
  )
}
