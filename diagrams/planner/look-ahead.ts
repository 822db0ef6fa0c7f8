import type { Circuit } from '../document/circuit-schema'
import type { Workplace } from './cost'
import { effortOf, minutesOf, standingIn } from './effort'
import type { Particle } from './particles'
import { bestByPlayingOut } from './play-out'
import { readingPrice, worthOf, type WeighedReading } from './scales'

/** Readings that may follow in a run played out; of these so many are tried as the first. */
const mostFollowing = 40
const mostFirst = 12
/** The evaluator calls a place the place when it holds this much. */
const foundFrom = 0.95

/**
 * The reading to take first when few places are left, by playing out what would follow. The way to a connector is
 * paid once and serves all readings there, and two readings that tell little apart may tell all together: bits
 * for one reading's minutes see neither.
 */
export function lookAhead(
  circuit: Circuit,
  found: readonly WeighedReading[],
  particles: readonly Particle[],
  workplace: Workplace,
  groups: readonly string[][],
): WeighedReading | undefined {
  const short = shortList(found)
  const efforts = short.map((reading) => effortOf(circuit, reading.probe))
  const start = standingIn(circuit, workplace.condition)
  const outcomes = short.map((reading) => {
    const outcome = new Int16Array(particles.length).fill(-1)
    reading.bins.forEach((bin, b) => {
      for (const i of bin.members) outcome[i] = b
    })
    return outcome
  })
  const { unitOf, units } = unitsOf(particles, groups)
  const best = bestByPlayingOut(
    {
      outcomes,
      weights: particles.map(({ weight }) => weight),
      unitOf,
      units,
      foundFrom,
      costOf: (reading, path) => {
        const now = path.length > 0 ? efforts[path.at(-1)!]! : start
        const reached = new Set(workplace.reached)
        for (const taken of path) for (const id of efforts[taken]!.reaches) reached.add(id)
        return minutesOf(efforts[reading]!, now, reached) + readingPrice
      },
    },
    mostFirst,
  )
  return short[best]
}

/** A group that cannot be told apart is one thing to find. */
function unitsOf(particles: readonly Particle[], groups: readonly string[][]) {
  const numbers = new Map<string, number>()
  groups.forEach((group, g) => {
    for (const site of group) numbers.set(site, g)
  })
  let units = groups.length
  for (const { site } of particles) if (!numbers.has(site)) numbers.set(site, units++)
  return { unitOf: Int32Array.from(particles, ({ site }) => numbers.get(site)!), units }
}

/** The most worthwhile readings, of those that split alike the best. */
function shortList(found: readonly WeighedReading[]): WeighedReading[] {
  const partitions = new Set<string>()
  const list: WeighedReading[] = []
  for (const reading of found.toSorted((a, b) => worthOf(b) - worthOf(a))) {
    const key = reading.bins.map((bin) => bin.members.join(',')).join('|')
    if (partitions.has(key)) continue
    partitions.add(key)
    list.push(reading)
    if (list.length === mostFollowing) break
  }
  return list
}
