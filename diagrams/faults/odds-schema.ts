import { z } from 'zod'
import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import { modes, sitesOf, type Mode } from '../document/sites'
import { modesOfClass, partClasses } from './part-class'

const weightSchema = z.number().min(1e-6).max(1e6)
const byModeSchema = z.partialRecord(z.enum(modes), weightSchema)

/**
 * How often what fails, as an organisation has found it: weights by class of place and way to fail, only their
 * ratios count. `sites` holds weights of single places of this circuit, over those of their class. What is not
 * named keeps the default table's weight; `updateOdds` makes such a table from what was found.
 */
export const oddsSchema = z.strictObject({
  classes: z.partialRecord(z.enum(partClasses), byModeSchema).default({}),
  sites: z.record(z.string().max(120), byModeSchema).default({}),
})
export type Odds = z.infer<typeof oddsSchema>

/** Weights of what cannot fail so, or is not there. Paths start at `odds`. */
export function checkOdds(circuit: Circuit, odds: Odds): Problem[] {
  const problems: Problem[] = []
  const check = (path: string, name: string, given: readonly string[], possible: readonly Mode[]) => {
    for (const mode of given)
      if (!possible.includes(mode as Mode))
        problems.push({
          path: `${path}.${mode}`,
          message: `${name} cannot be ${mode}, expected ${possible.join(', ')}`,
        })
  }
  for (const name of partClasses)
    check(
      `odds.classes.${name}`,
      `class "${name}"`,
      Object.keys(odds.classes[name] ?? {}),
      modesOfClass[name],
    )
  const named = Object.entries(odds.sites)
  if (named.length === 0) return problems
  const possible = new Map(sitesOf(circuit).map((site) => [site.id, site.modes]))
  for (const [site, weights] of named) {
    const modesOfSite = possible.get(site)
    if (!modesOfSite) problems.push({ path: `odds.sites.${site}`, message: `place "${site}" does not exist` })
    else check(`odds.sites.${site}`, `place "${site}"`, Object.keys(weights), modesOfSite)
  }
  return problems
}
