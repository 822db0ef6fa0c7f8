import type { Alteration } from '../solver/alteration'
import { casesAfter } from '../solver/blown-fuses'
import { branchAmps, type Case, type Settled } from '../solver/case'
import { blowsAtRatingTimes } from '../solver/constants'
import type { Network } from '../solver/network'
import type { Study } from '../solver/study'
import { restingRange } from './battery-range'
import { eager, reluctant } from './prediction-table'

/** Battery and tolerances move the current through a fuse by less than this, either way. */
const slack = { low: 0.88, high: 1.14 }
/** Beyond this many outcomes a short says little anyway. */
const mostSets = 16

/**
 * Every set of fuses that a short may have blown on a real vehicle, whose parts and battery are a
 * little off the drawing: where two fuses carry nearly as much for their rating, either may have
 * given way first, and one near its limit may have held.
 */
export function possibleBlown(
  network: Network,
  studies: readonly Study[],
  alteration: Alteration,
  severity: number,
  cache: Map<string, Case[]>,
): string[][] {
  const found = new Map<string, string[]>()
  const seen = new Set<string>()
  const explore = (blown: string[]) => {
    const key = blown.toSorted().join(',')
    if (seen.has(key) || found.size >= mostSets) return
    seen.add(key)
    const loads = overloads(network, casesAfter(studies, alteration, blown, cache), severity)
    const left = network.fuses.flatMap((fuse, i) =>
      blown.includes(fuse.node) ? [] : [{ node: fuse.node, ...loads[i]! }],
    )
    if (left.every((fuse) => fuse.least <= blowsAtRatingTimes)) found.set(key, blown)
    const surest = Math.max(0, ...left.map((fuse) => fuse.least))
    for (const fuse of left)
      if (fuse.most > blowsAtRatingTimes && fuse.most >= surest) explore([...blown, fuse.node])
  }
  explore([])
  return [...found.values()]
}

/** Least and most that each fuse may carry, in times its rating, over all driving conditions. */
function overloads(
  network: Network,
  cases: readonly Case[],
  severity: number,
): { least: number; most: number }[] {
  const byDoubt = [1, eager, reluctant].map((reluctance) => {
    const times = network.fuses.map(() => 0)
    for (const given of cases) {
      const scale =
        reluctance === 1 ? given.scaleFor(severity) : reluctance < 1 ? restingRange.high : restingRange.low
      const settled = given.settle(severity, scale, reluctance)
      const states: Settled[] = settled ? [settled] : given.passed
      for (const state of states)
        network.fuses.forEach((fuse, i) => {
          times[i] = Math.max(times[i]!, Math.abs(branchAmps(given, state, fuse.branch)) / fuse.amps)
        })
    }
    return times
  })
  return network.fuses.map((_, i) => {
    const times = byDoubt.map((list) => list[i]!)
    return { least: slack.low * Math.min(...times), most: slack.high * Math.max(...times) }
  })
}
