import type { Circuit, ControlsSetting } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import type { Probe, Reading } from '../document/reading-schema'
import type { FaultModel } from '../faults/fault-model'
import type { Posterior } from '../faults/posterior'
import { runToEnd, type Steps } from '../faults/steps'
import { readingsWithLeads } from './added-leads'
import { groupsAlike } from './alike'
import { candidateReadings, mostConditions, type CandidateSet } from './candidates'
import { chooseNext } from './choose-next'
import { lookAhead } from './look-ahead'
import { particlesOf, pilotOf, type Particle } from './particles'
import { Scales, type PlannedReading, type WeighedReading } from './scales'
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
/** When this few places are in question leads are thought of, and every condition: before that, plain readings split better. */
const fewPlaces = 24
/** Below this a place is hardly in question. */
const leastInQuestion = 0.003
/** A group that holds this much may soon be called the place. */
const groupFrom = 0.5
/** A reading worth less than this need not be taken; then the search is made wider round this many places. */
export const worthwhileBits = 0.05
const likeliest = 4

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
  const pilot = pilotOf(particles, suspects) ?? particles
  const scales = new Scales(model, pilot, readings, (bins) => alike.see(bins, pilot))
  const present = scales.workplace.condition

  // While much is in question the plain conditions are enough to split it; later every one counts.
  const inQuestion = suspects.filter((site) => bySite.get(site)! >= leastInQuestion).length
  const few = inQuestion <= fewPlaces
  const weighed = Math.max(leastConditions, Math.round(weighings / pilot.length))
  const limit = few ? mostConditions : Math.min(mostConditions, weighed)
  yield* weighAll(scales, candidateReadings(circuit, suspects, present, { limit }))
  if (few) yield* weighAll(scales, readingsWithLeads(circuit, suspects, present))
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
  // "No reading is worth taking any more" is said of all readings, not of the plain ones.
  if (scales.found.every(({ bits }) => bits < worthwhileBits))
    yield* weighAll(scales, wideReadings(circuit, suspects.slice(0, likeliest)))
  const found =
    pilot === particles ? scales.found : yield* lookClosely(model, particles, readings, scales.found)
  const inseparable = alike.groups()
  const best = few ? lookAhead(circuit, found, particles, scales.workplace, inseparable) : undefined
  return {
    particles,
    next: chooseNext(circuit, found, best),
    mostBits: Math.max(0, ...found.map(({ bits }) => bits)),
    inseparable,
  }
}

/** Readings that a first look is followed up by: the best by bits per minute and the best by bits. */
const looked = 20
/** In this many conditions at least; in more where there are few particles. */
const leastLooked = 3

/** Weighs the most promising readings of a first look once more, by all particles. */
function* lookClosely(
  model: FaultModel,
  particles: readonly Particle[],
  readings: readonly Reading[],
  found: readonly WeighedReading[],
): Steps<WeighedReading[]> {
  const best = new Set([
    ...found.toSorted((a, b) => b.rate - a.rate).slice(0, looked),
    ...found.toSorted((a, b) => b.bits - a.bits).slice(0, looked),
  ])
  const most = Math.max(leastLooked, Math.round(weighings / particles.length))
  const byCondition = new Map<Condition, Probe[]>()
  for (const { probe } of best) {
    const probes = byCondition.get(probe.condition)
    if (probes) probes.push(probe)
    else if (byCondition.size < most) byCondition.set(probe.condition, [probe])
  }
  const scales = new Scales(model, particles, readings)
  yield* weighAll(
    scales,
    [...byCondition].map(([condition, probes]) => ({ condition, probes })),
  )
  return scales.found
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
