import type { Reading } from '../document/reading-schema'
import { FaultModel, probeKey } from '../faults/fault-model'
import type { Hypothesis } from '../faults/hypothesis'
import type { FittingBox, PairSearch } from '../faults/pair-search'
import type { PairMember } from '../faults/pair-member'
import type { Steps } from '../faults/steps'
import { withBlown } from '../solver/alteration'
import { fuseBranch } from '../solver/blown-fuses'
import { besides, type HeldFault } from '../solver/held-fault'
import { alikePlaces } from './alike-places'
import { groupsAlike } from './alike'
import { candidateReadings, type CandidateSet } from './candidates'
import { minutesFor, workplaceAfter } from './cost'
import { forecast } from './forecast'
import type { Particle } from './particles'
import type { Plan, PlannedReading } from './plan-next'
import { binsOf, bitsOf } from './split'

const mostParticles = 60
const leastBits = 0.01
const offered = 5
const weighings = 3000
const leastConditions = 8
const mostConditions = 24

/** A pair of definite severities that stands for part of the probability. */
interface PairParticle {
  /** Number of its pair of places. */
  pair: number
  sites: readonly [string, string]
  held: HeldFault
  /** The other fault, as a hypothesis of the network that holds the first. */
  swept: Hypothesis
  severity: number
  weight: number
}

/**
 * The plan while two faults are in play: the same one step of look-ahead, over pairs instead of single places.
 * Each held fault makes a network of its own, in which its partners are forecast like single faults.
 */
export function* planPairs(search: PairSearch, readings: readonly Reading[]): Steps<Plan> {
  const { model } = search.solver
  const { circuit } = model
  const particles = pairParticles(search)
  // What a reading leaves is told by places: each pair counts for both of its own, half and half.
  const byPlace = particles.flatMap((particle): Particle[] =>
    particle.sites.map((site) => ({
      hypothesis: particle.swept,
      site,
      severity: particle.severity,
      weight: particle.weight / 2,
    })),
  )
  const unitOf = Int32Array.from(byPlace, (_, i) => particles[i >> 1]!.pair)
  const units = Math.max(...unitOf, -1) + 1
  const weights = Float64Array.from(byPlace, (particle) => particle.weight)
  const byPair = new Map<string, number>()
  for (const { sites, weight } of particles)
    byPair.set(pairKey(sites), (byPair.get(pairKey(sites)) ?? 0) + weight)
  const alike = groupsAlike([...byPair.keys()], byPair)
  const pairOnly = particles.map(
    (particle): Particle => ({ ...particle, hypothesis: particle.swept, site: pairKey(particle.sites) }),
  )
  const suspects = [...new Set(particles.flatMap(({ sites }) => sites))]
  const workplace = workplaceAfter(circuit, readings)
  const taken = new Set(readings.map((reading) => probeKey(circuit, reading)))

  const found: (PlannedReading & { rate: number })[] = []
  let mostBits = 0
  const limit = Math.min(
    mostConditions,
    Math.max(leastConditions, Math.round(weighings / Math.max(1, particles.length))),
  )
  const sets = candidateReadings(circuit, suspects, workplace.condition, { limit })
  for (const [done, set] of sets.entries()) {
    yield { stage: 'planning', done, of: sets.length }
    if (set.condition.added.length > 0) continue
    const rows = forecastPairs(search, set, particles)
    set.probes.forEach((probe, i) => {
      const single = binsOf(probe.kind, rows[i]!)
      if (single.length < 2) return
      alike.see(single, pairOnly)
      if (taken.has(probeKey(circuit, probe))) return
      const row = Float64Array.from(byPlace, (_, p) => rows[i]![p >> 1]!)
      const bins = binsOf(probe.kind, row)
      const bits = bitsOf(bins, weights, unitOf, units)
      if (bits < leastBits) return
      mostBits = Math.max(mostBits, bits)
      const minutes = minutesFor(circuit, probe, workplace)
      found.push({ probe, bits, minutes, bins, row, rate: bits / minutes })
    })
  }
  found.sort((a, b) => b.rate - a.rate)
  const partitions = new Set<string>()
  const next = found.filter(({ bins }) => {
    const key = bins.map((bin) => bin.members.join(',')).join('|')
    if (partitions.has(key) || partitions.size >= offered) return false
    partitions.add(key)
    return true
  })
  const groups = alike.groups().map((group) => group.map((key) => key.split(between) as [string, string]))
  return { particles: byPlace, next, mostBits, inseparable: alikePlaces(groups) }
}

/** No site's id holds a line break. */
const between = '\n'
const pairKey = (sites: readonly string[]) => sites.join(between)

/** The likeliest boxes of each pair, a few of each so that no pair is left out. */
function pairParticles({ solver, boxes, logEvidence }: PairSearch): PairParticle[] {
  const pairs = new Map<string, { boxes: FittingBox[]; mass: number }>()
  for (const box of boxes) {
    const key = pairKey([box.pair.held.site, box.pair.swept.site].toSorted())
    const entry = pairs.get(key) ?? { boxes: [], mass: 0 }
    pairs.set(key, entry)
    entry.boxes.push(box)
    entry.mass += Math.exp(box.log - logEvidence)
  }
  const heaviest = [...pairs].toSorted((a, b) => b[1].mass - a[1].mass).slice(0, mostParticles)
  const each = Math.max(1, Math.min(3, Math.floor(mostParticles / heaviest.length)))
  return heaviest.flatMap(([key, pair], number) => {
    const chosen = pair.boxes.slice(0, each)
    const masses = chosen.map((box) => Math.exp(box.log - chosen[0]!.log))
    const whole = masses.reduce((sum, mass) => sum + mass, 0)
    return chosen.map((box, i): PairParticle => {
      const held = solver.heldAt(box.pair.held, middle(box.pair.held, box.held), solver.model.network)
      return {
        pair: number,
        sites: key.split(between) as [string, string],
        held,
        swept: sweptIn(held, box),
        severity: middle(box.pair.swept, box.swept),
        weight: (pair.mass * masses[i]!) / whole,
      }
    })
  })
}

function middle({ mode }: PairMember, [low, high]: readonly [number, number]): number {
  return mode === 'weak' || low === 0 ? (low + high) / 2 : Math.sqrt(low * high)
}

function sweptIn(held: HeldFault, { pair }: FittingBox): Hypothesis {
  const { site, mode, other = null, wire = null, alteration } = pair.swept
  const beside = withBlown(besides(held, alteration), pair.blown.map(fuseBranch))
  return { site, mode, other, wire, blows: [...pair.blown], part: 1, cells: [], alteration: () => beside }
}

/** One row a probe, one column a particle: each held fault's partners forecast on its own network. */
function forecastPairs(
  { solver }: PairSearch,
  set: CandidateSet,
  particles: readonly PairParticle[],
): Float64Array[] {
  const rows = set.probes.map(() => new Float64Array(particles.length))
  const groups = new Map<HeldFault, number[]>()
  particles.forEach(({ held }, p) => {
    const list = groups.get(held)
    if (list) list.push(p)
    else groups.set(held, [p])
  })
  for (const [held, members] of groups) {
    const model = new FaultModel(solver.model.circuit, { network: held.network, hypotheses: [] })
    const part = forecast(
      model,
      set,
      members.map((p): Particle => {
        const { swept, severity, weight, sites } = particles[p]!
        return { hypothesis: swept, site: pairKey(sites), severity, weight }
      }),
    )
    part.forEach((row, i) => members.forEach((p, column) => (rows[i]![p] = row[column]!)))
  }
  return rows
}
