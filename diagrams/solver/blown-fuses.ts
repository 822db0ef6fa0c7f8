import { controlCombinations } from '../document/condition'
import { restCondition } from '../document/condition-schema'
import { withBlown, type Alteration } from './alteration'
import { Case, fuseAmps, type Settled } from './case'
import { blowsAtRatingTimes } from './constants'
import type { Network } from './network'
import { Study } from './study'

/** Combinations of controls looked at when a circuit has very many. */
const combinationLimit = 256

/** Studies of every combination of controls with everything plugged in, the conditions a vehicle is driven in. */
export function drivingStudies(network: Network): Study[] {
  return controlCombinations(network.circuit, combinationLimit).map(
    (controls) => new Study(network, { ...restCondition, controls }),
  )
}

/**
 * The fuses that a short has blown, most overloaded first: in any combination of controls more than
 * 1.35 times the rating goes through, states of a chattering relay counted. Node ids.
 * `cache` may be shared between severities of the same alteration.
 */
export function blownFuses(
  network: Network,
  studies: readonly Study[],
  alteration: Alteration,
  severity: number,
  cache = new Map<string, Case[]>(),
): string[] {
  const blown: string[] = []
  for (;;) {
    let worst = blowsAtRatingTimes
    let worstFuse: string | null = null
    for (const each of casesAfter(studies, alteration, blown, cache)) {
      const settled = each.settle(severity)
      const states: Settled[] = settled ? [settled] : each.passed
      for (const state of states)
        network.fuses.forEach((fuse, i) => {
          const times = Math.abs(fuseAmps(each, state, i)) / fuse.amps
          if (times > worst && !blown.includes(fuse.node)) {
            worst = times
            worstFuse = fuse.node
          }
        })
    }
    if (worstFuse === null) return blown
    blown.push(worstFuse)
  }
}

/** Cases of every study with the fault in it and these fuses blown; kept in `cache` by the fuses. */
export function casesAfter(
  studies: readonly Study[],
  alteration: Alteration,
  blown: readonly string[],
  cache: Map<string, Case[]>,
): Case[] {
  const key = blown.join(',')
  let found = cache.get(key)
  if (!found) {
    const after = withBlown(alteration, blown.map(fuseBranch))
    cache.set(key, (found = studies.map((study) => new Case(study, after))))
  }
  return found
}

/** Branch name of a fuse. */
export function fuseBranch(node: string): string {
  return `part:${node}`
}
