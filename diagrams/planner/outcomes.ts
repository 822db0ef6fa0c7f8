import type { NextOutcome } from '../faults/answer'
import type { Probe } from '../document/reading-schema'
import type { Particle } from './particles'
import type { PlannedReading } from './plan-next'
import { resolution, type Bin } from './split'
import { figure } from './wording'

/** Outcomes rarer than this are not announced. */
const leastProbability = 0.004
const mostOutcomes = 4

/** What each outcome of a reading would be about, between which figures, how likely, and which sites it leaves. */
export function outcomesOf(planned: PlannedReading, particles: readonly Particle[]): NextOutcome[] {
  const { probe, bins, row } = planned
  let covered = 0
  for (const bin of bins) covered += massOf(bin, particles)
  return mergeSlivers(bins, particles)
    .map((bin) => outcomeOf(probe, bin, particles, row, covered))
    .filter((outcome) => outcome.probability >= leastProbability)
}

/** Keeps the heaviest outcomes apart and lets lighter ones join their nearest neighbour. */
function mergeSlivers(bins: readonly Bin[], particles: readonly Particle[]): Bin[] {
  // OL stands apart: no figure lies next to it.
  const beyond = bins.filter((bin) => bin.low === Infinity)
  const merged = bins
    .filter((bin) => bin.low !== Infinity)
    .map((bin) => ({ ...bin, members: [...bin.members] }))
  while (merged.length + beyond.length > mostOutcomes) {
    let lightest = 0
    for (let b = 1; b < merged.length; b++)
      if (massOf(merged[b]!, particles) < massOf(merged[lightest]!, particles)) lightest = b
    const sliver = merged[lightest]!
    const left = merged[lightest - 1]
    const right = merged[lightest + 1]
    const nearer = left && right ? sliver.low - left.high <= right.low - sliver.high : Boolean(left)
    const into = nearer ? left! : right!
    into.low = Math.min(into.low, sliver.low)
    into.high = Math.max(into.high, sliver.high)
    into.members.push(...sliver.members)
    merged.splice(lightest, 1)
  }
  return [...merged, ...beyond]
}

function outcomeOf(
  probe: Probe,
  bin: Bin,
  particles: readonly Particle[],
  row: Float64Array,
  covered: number,
): NextOutcome {
  const bySite = new Map<string, number>()
  const mass = massOf(bin, particles)
  for (const i of bin.members) {
    const particle = particles[i]!
    if (particle.site !== '') bySite.set(particle.site, (bySite.get(particle.site) ?? 0) + particle.weight)
  }
  const leaves = [...bySite]
    .filter(([, weight]) => weight > 0.005 * mass)
    .toSorted((a, b) => b[1] - a[1])
    .map(([site]) => site)
  const probability = covered > 0 ? mass / covered : 0
  if (probe.kind === 'works') return { about: bin.high >= 0.5 ? 'works' : 'does not', probability, leaves }
  if (probe.kind === 'sees') return { about: bin.high >= 0.5 ? 'high' : 'low', probability, leaves }
  if (bin.low === Infinity) return { about: 'OL', probability, leaves }
  const { high } = bin
  const slack = resolution(probe.kind, high)
  return {
    about: figure(probe.kind, typicalOf(bin, particles, row)),
    low: probe.kind === 'ohms' ? Math.max(0, bin.low - slack) : bin.low - slack,
    high: high + slack,
    probability,
    leaves,
  }
}

function massOf(bin: Bin, particles: readonly Particle[]): number {
  let mass = 0
  for (const i of bin.members) mass += particles[i]!.weight
  return mass
}

/** The figure in the middle of an outcome's probability. */
function typicalOf(bin: Bin, particles: readonly Particle[], row: Float64Array): number {
  const order = bin.members.toSorted((a, b) => row[a]! - row[b]!)
  const half = massOf(bin, particles) / 2
  let before = 0
  for (const i of order) {
    before += particles[i]!.weight
    if (before >= half) return row[i]!
  }
  return bin.low
}
