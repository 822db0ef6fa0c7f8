import type { Particle } from './particles'
import type { Bin } from './split'

/** Sites under this probability are not compared. */
const leastProbability = 0.003
const mostSites = 24
/** Two sites look alike while no reading parts more than this of one from the other: one severity of a dozen is a hair. */
const alikeOverlap = 0.1

export interface AlikeSearch {
  /** Takes one reading's outcomes into account. */
  see(bins: readonly Bin[], particles: readonly Particle[]): void
  /** Groups of two or more sites that no reading seen so far tells apart. */
  groups(): string[][]
}

/** Watches every candidate reading for whether it parts two suspects; those never parted are a group. */
export function groupsAlike(
  suspects: readonly string[],
  probabilityOf: ReadonlyMap<string, number>,
): AlikeSearch {
  const sites = suspects.filter((site) => probabilityOf.get(site)! >= leastProbability).slice(0, mostSites)
  const indexOf = new Map(sites.map((site, i) => [site, i]))
  const apart = sites.map(() => sites.map(() => false))
  let together: [number, number][] = sites.flatMap((_, x) =>
    sites.slice(x + 1).map((_, i): [number, number] => [x, x + 1 + i]),
  )
  return {
    see(bins, particles) {
      if (together.length === 0) return
      // Share of each site's probability per outcome.
      const shares = bins.map(() => new Float64Array(sites.length))
      const whole = new Float64Array(sites.length)
      bins.forEach((bin, b) => {
        for (const i of bin.members) {
          const index = indexOf.get(particles[i]!.site)
          if (index === undefined) continue
          shares[b]![index]! += particles[i]!.weight
          whole[index]! += particles[i]!.weight
        }
      })
      for (const [x, y] of together) {
        if (whole[x] === 0 || whole[y] === 0) continue
        let distance = 0
        for (const share of shares) distance += Math.abs(share[x]! / whole[x]! - share[y]! / whole[y]!) / 2
        if (distance > alikeOverlap) apart[x]![y] = true
      }
      together = together.filter(([x, y]) => !apart[x]![y])
    },
    groups() {
      const groupOf = sites.map((_, i) => i)
      for (let x = 0; x < sites.length; x++)
        for (let y = x + 1; y < sites.length; y++)
          if (!apart[x]![y]) groupOf[y] = Math.min(groupOf[y]!, groupOf[x]!)
      const groups = new Map<number, string[]>()
      sites.forEach((site, i) => {
        const list = groups.get(groupOf[i]!)
        if (list) list.push(site)
        else groups.set(groupOf[i]!, [site])
      })
      return [...groups.values()].filter((group) => group.length > 1)
    },
  }
}
