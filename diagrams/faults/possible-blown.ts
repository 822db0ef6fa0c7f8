import type { Alteration } from '../solver/alteration'
import { casesAfter } from '../solver/blown-fuses'
import type { Base } from '../solver/base'
import { fuseAmps, untouched, type Case, type Located, type Settled } from '../solver/case'
import { blowsAtRatingTimes } from '../solver/constants'
import type { Network } from '../solver/network'
import type { Study } from '../solver/study'
import { restingRange } from './battery-range'
import { predictAmps, type Prediction } from './prediction'
import { eager, isCertain, reluctant } from './reluctance'

/** The battery alone moves a current by less than this; far from the limit nothing else matters. */
const battery = { low: 0.93, high: 1.02 }
const farBelow = 0.3
const farAbove = 4
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

interface Load {
  least: number
  most: number
}

/** Least and most that each fuse may carry, in times its rating, over all driving conditions. */
function overloads(network: Network, cases: readonly Case[], severity: number): Load[] {
  const none = () => network.fuses.map((): Load => ({ least: 0, most: 0 }))
  // As drawn, a little eager, a little reluctant.
  const byDoubt = [none(), none(), none()] as const
  const note = (loads: Load[], given: Case, states: readonly Settled[]) => {
    for (const state of states)
      for (let i = 0; i < network.fuses.length; i++) {
        const load = loadOf(given, state, i)
        const { least, most } = loads[i]!
        loads[i] = { least: Math.max(least, load.least), most: Math.max(most, load.most) }
      }
  }
  for (const given of cases) {
    const settled = given.settle(severity)
    const states = settled ? [settled] : given.passed
    note(byDoubt[0], given, states)
    if (settled && given.passed.every((state) => isCertain(given, state))) {
      note(byDoubt[1], given, states)
      note(byDoubt[2], given, states)
      continue
    }
    for (const [loads, scale, reluctance] of [
      [byDoubt[1], restingRange.high, eager],
      [byDoubt[2], restingRange.low, reluctant],
    ] as const) {
      const other = given.settle(severity, scale, reluctance)
      note(loads, given, other ? [other] : given.passed)
    }
  }
  return network.fuses.map((_, i) => ({
    least: Math.min(...byDoubt.map((loads) => loads[i]!.least)),
    most: Math.max(...byDoubt.map((loads) => loads[i]!.most)),
  }))
}

/** A change of this many times its rating leaves what tolerances can do to a fuse nearly as it was. */
const hardlyMoved = 0.02

/** Where current divides between ways of nearly no resistance, 5 % of a part can be most of a fuse's current. */
function loadOf(given: Case, state: Settled, index: number): Load {
  const { amps } = given.study.network.fuses[index]!
  const carried = fuseAmps(given, state, index)
  const times = Math.abs(carried) / amps
  if (times < farBelow * blowsAtRatingTimes || times > farAbove * blowsAtRatingTimes)
    return { least: times, most: times }
  const plain = reachInBase(given, state, index)
  const moved = Math.abs(carried - (state.scale * plain.battery + plain.fixed)) / amps
  const reach =
    moved < hardlyMoved
      ? (state.scale * plain.reachBattery + plain.reachFixed) / amps + moved
      : times * reachPart(given, state, index)
  return { least: battery.low * (times - reach), most: battery.high * (times + reach) }
}

const parts = new WeakMap<Located, Map<number, { severity: number; part: number }>>()

/**
 * What tolerances can do to a fuse's current, as part of it. Of a short in one state of the parts it is worked out at
 * the harshest severity asked for: the milder the short, the less the other parts have to say in its current.
 */
function reachPart(given: Case, state: Settled, index: number): number {
  let byFuse = parts.get(state.located)
  if (!byFuse) parts.set(state.located, (byFuse = new Map()))
  let found = byFuse.get(index)
  if (!found || found.severity > state.severity) {
    const { branch } = given.study.network.fuses[index]!
    const own = predictAmps(given, state, branch)
    const amps = Math.abs(state.scale * own.battery + own.fixed)
    const reach = state.scale * own.reachBattery + own.reachFixed
    byFuse.set(index, (found = { severity: state.severity, part: reach / Math.max(amps, 1e-9) }))
  }
  return found.part
}

const reaches = new WeakMap<Base, Map<number, Prediction>>()

/** What a fuse carries in a network without the fault itself, and what tolerances do to that; most faults leave it so. */
function reachInBase(given: Case, { located: { base }, states }: Settled, index: number): Prediction {
  let byFuse = reaches.get(base)
  if (!byFuse) reaches.set(base, (byFuse = new Map()))
  let found = byFuse.get(index)
  if (!found) {
    const { branch } = given.study.network.fuses[index]!
    byFuse.set(index, (found = predictAmps(given, untouched(base, states), branch)))
  }
  return found
}
