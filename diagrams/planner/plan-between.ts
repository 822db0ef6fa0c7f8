import type { Reading } from '../document/reading-schema'
import type { FaultModel } from '../faults/fault-model'
import type { Posterior } from '../faults/posterior'
import { readingsWithLeads } from './added-leads'
import { candidateReadings } from './candidates'
import { chooseNext } from './choose-next'
import { particlesOf, type Particle } from './particles'
import { Scales, type PlannedReading } from './scales'
import { wideReadings } from './wide-readings'

export interface BetweenPlan {
  particles: Particle[]
  /** Readings that tell the places apart, best bits per minute first; empty when none does. */
  next: PlannedReading[]
}

/** A reading tells places apart when it is expected to bring this much of what parts them, bits: more than a hair. */
const partsFromBits = 0.1

/**
 * Readings that would settle between places, as if the fault were at one of them, each as likely as the
 * other. The plain ones and those with leads first; only where none of them tells the places apart is
 * the search made wider.
 */
export function planBetween(
  model: FaultModel,
  posterior: Posterior,
  readings: readonly Reading[],
  sites: readonly string[],
): BetweenPlan {
  const { circuit } = model
  const particles = particlesOfSites(model, posterior, sites)
  const scales = new Scales(model, particles, readings)
  const present = scales.workplace.condition
  const parting = () => scales.found.filter(({ bits }) => bits >= partsFromBits)
  for (const set of candidateReadings(circuit, sites, present)) scales.weigh(set)
  for (const set of readingsWithLeads(circuit, sites, present)) scales.weigh(set)
  if (parting().length === 0) for (const set of wideReadings(circuit, sites)) scales.weigh(set)
  return { particles, next: chooseNext(circuit, parting()) }
}

/** The faults of the places as the readings leave them; those the readings rule out as they were before any. */
function particlesOfSites(model: FaultModel, posterior: Posterior, sites: readonly string[]): Particle[] {
  const left = particlesOf(model, posterior)
  return sites.flatMap((site) => {
    const own = left.filter((particle) => particle.site === site)
    const all = own.length > 0 ? own : plainParticles(model, site)
    const mass = all.reduce((sum, { weight }) => sum + weight, 0)
    return all.map((particle) => ({ ...particle, weight: particle.weight / (mass * sites.length) }))
  })
}

/** Every hypothesis of a place alike, at the middle of its severities. */
function plainParticles(model: FaultModel, site: string): Particle[] {
  return model.hypotheses.flatMap((hypothesis) => {
    if (hypothesis.site !== site) return []
    const { low, high } = hypothesis.cells[hypothesis.cells.length >> 1]!
    const severity = hypothesis.mode === 'weak' || low === 0 ? (low + high) / 2 : Math.sqrt(low * high)
    return [{ hypothesis, site, severity, weight: 1 }]
  })
}
