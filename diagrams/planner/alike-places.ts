/**
 * Places that no reading tells apart, from pairs of places that no reading tells apart: two places are alike
 * when each makes such a pair with the same third one.
 */
export function alikePlaces(groups: readonly (readonly (readonly [string, string])[])[]): string[][] {
  const first = new Map<string, string>()
  const rootOf = (site: string): string => {
    const up = first.get(site)
    return up === undefined || up === site ? site : rootOf(up)
  }
  for (const pairs of groups) {
    const partners = new Map<string, string[]>()
    for (const [a, b] of pairs)
      for (const [one, other] of [
        [a, b],
        [b, a],
      ] as const)
        partners.set(one, [...(partners.get(one) ?? []), other])
    for (const alike of partners.values())
      for (const site of alike) first.set(rootOf(site), rootOf(alike[0]!))
  }
  const found = new Map<string, string[]>()
  for (const site of new Set(groups.flat(2))) {
    const root = rootOf(site)
    found.set(root, [...(found.get(root) ?? []), site])
  }
  return [...found.values()].filter((group) => group.length > 1)
}
