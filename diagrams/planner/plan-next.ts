import type { Circuit, ControlsSetting } from '../document/circuit-schema'
import type { Probe, Reading } from '../document/reading-schema'
import { probeKey, type FaultModel } from '../faults/fault-model'
import { candidateReadings, mostConditions, type CandidateSet } from './candidates'
import { minutesFor, workplaceAfter } from './cost'
import { forecast } from './forecast'
import { groupsAlike } from './alike'
import { particlesOf, type Particle } from './particles'
import { binsOf, bitsOf, type Bin } from './split'
import type { Posterior } from '../faults/posterior'

/** A reading worth taking, before it is put into words. */
export interface PlannedReading {
  probe: Probe
  bits: number
  minutes: number
  bins: Bin[]
  /** What each particle foretells. */
  row: Float64Array
}

export interface Plan {
  particles: Particle[]
  /** Best bits per minute first. */
  next: PlannedReading[]
  /** Bits of the best reading by bits alone, whatever it costs. */
  mostBits: number
  /** Sites that no candidate reading tells apart. */
  inseparable: string[][]
}

/** Readings under this are not worth a name. */
const leastBits = 0.01
const offered = 5
/** Particles times conditions that one plan weighs, about, and the conditions it always weighs. */
const weighings = 6000
const leastConditions = 12

/**
 * Weighs every candidate reading by the drop in entropy over sites it is expected to bring, divided
 * by its minutes: one step of look-ahead. Never repeats a reading already taken.
 */
export function planNext(model: FaultModel, posterior: Posterior, readings: readonly Reading[]): Plan {
  const { circuit } = model
  const particles = particlesOf(model, posterior)
  const bySite = new Map<string, number>()
  for (const particle of particles)
    bySite.set(particle.site, (bySite.get(particle.site) ?? 0) + particle.weight)
  const sites = [...bySite.keys()]
  const units = new Map(sites.map((site, i) => [site, i]))
  const unitOf = Int32Array.from(particles, (particle) => units.get(particle.site)!)
  const weights = Float64Array.from(particles, (particle) => particle.weight)
  const suspects = sites.filter((site) => site !== '').toSorted((a, b) => bySite.get(b)! - bySite.get(a)!)
  const workplace = workplaceAfter(circuit, readings)
  const taken = new Set(readings.map((reading) => probeKey(circuit, reading)))
  const alike = groupsAlike(suspects, bySite)

  const found: (PlannedReading & { rate: number })[] = []
  let mostBits = 0
  const weigh = (set: CandidateSet) => {
    const rows = forecast(model, set, particles)
    set.probes.forEach((probe, i) => {
      const bins = binsOf(probe.kind, rows[i]!)
      if (bins.length < 2) return
      alike.see(bins, particles)
      if (taken.has(probeKey(circuit, probe))) return
      const bits = bitsOf(bins, weights, unitOf, sites.length)
      if (bits < leastBits) return
      mostBits = Math.max(mostBits, bits)
      const minutes = minutesFor(circuit, probe, workplace)
      found.push({
        probe,
        bits,
        minutes,
        bins,
        row: rows[i]!,
        rate: bits / minutes,
      })
    })
  }
  // While much is in question the plain conditions are enough to split it; later every one counts.
  const limit = Math.min(mostConditions, Math.max(leastConditions, Math.round(weighings / particles.length)))
  for (const set of candidateReadings(circuit, suspects, workplace.condition, { limit })) weigh(set)
  // Where all is read that tells suspects apart, the same leads with the controls moved count as a second look.
  if (found.length === 0 && readings.length > 0)
    for (const set of candidateReadings(circuit, suspects, workplace.condition, {
      deadControls: movedControls(circuit),
    }))
      weigh(set)
  found.sort((a, b) => b.rate - a.rate)
  const partitions = new Set<string>()
  const next: PlannedReading[] = []
  for (const { probe, bits, minutes, bins, row } of found) {
    // The same split at a higher price is no alternative.
    const partition = partitionKey(bins)
    if (partitions.has(partition)) continue
    partitions.add(partition)
    next.push({ probe, bits, minutes, bins, row })
    if (next.length === offered) break
  }
  return { particles, next, mostBits, inseparable: alike.groups() }
}

function partitionKey(bins: readonly Bin[]): string {
  return bins
    .map((bin) => bin.members.toSorted((a, b) => a - b).join(','))
    .toSorted()
    .join('|')
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
