/** Suspects with their odds, and readings by the outcome each suspect would give. */
export interface Instance {
  weights: number[]
  tests: number[][]
}

/** Where one suspect holds this much of what is left, the fault is located. */
export const locatedFrom = 0.95

/** Expected readings of the best tree until the fault is located: by every set of suspects once (2^n sets). */
export function bestTree({ weights, tests }: Instance): number {
  const n = weights.length
  const mass = new Float64Array(1 << n)
  const most = new Float64Array(1 << n)
  for (let set = 1; set < mass.length; set++) {
    const low = set & -set
    const weight = weights[31 - Math.clz32(low)]!
    mass[set] = mass[set ^ low]! + weight
    most[set] = Math.max(most[set ^ low]!, weight)
  }
  const masks = tests.map((test) => {
    const byOutcome = new Map<number, number>()
    test.forEach((outcome, i) => byOutcome.set(outcome, (byOutcome.get(outcome) ?? 0) | (1 << i)))
    return [...byOutcome.values()]
  })
  const cost = new Float64Array(1 << n)
  for (let set = 1; set < cost.length; set++) {
    if (most[set]! >= locatedFrom * mass[set]!) continue
    let best = Infinity
    for (const outcomes of masks) {
      let sum = 0
      let splits = true
      for (const outcome of outcomes) {
        const part = set & outcome
        if (part === set) {
          splits = false
          break
        }
        sum += cost[part]!
      }
      // Costs are weighted: each reading costs the mass of the suspects it is taken for.
      if (splits && sum + mass[set]! < best) best = sum + mass[set]!
    }
    cost[set] = best
  }
  return cost.at(-1)!
}

/** Expected readings when a chooser names the reading to take among those left; Infinity when it gives up. */
export function treeBy(
  { weights, tests }: Instance,
  choose: (left: readonly number[]) => readonly number[] | null,
): number {
  const costOf = (left: readonly number[]): number => {
    const mass = left.reduce((sum, m) => sum + weights[m]!, 0)
    if (left.some((m) => weights[m]! >= locatedFrom * mass)) return 0
    const best = choose(left)
    if (!best) return Infinity
    const outcomes = new Map<number, number[]>()
    for (const m of left) {
      const list = outcomes.get(best[m]!)
      if (list) list.push(m)
      else outcomes.set(best[m]!, [m])
    }
    if (outcomes.size < 2) return Infinity
    return [...outcomes.values()].reduce((sum, part) => sum + costOf(part), mass)
  }
  return tests.length === 0 ? Infinity : costOf([...weights.keys()])
}
