import type { Mode } from '../document/sites'
import type { Odds } from './odds-schema'
import { modesOfClass, partClasses, type PartClass } from './part-class'
import { classWeight } from './priors'

/** What was found at fault, repaired and proved, so many times. `site`: the place itself, of the circuit that the odds are for. */
export interface Finding {
  class: PartClass
  mode: Mode
  count: number
  site?: string
}

/**
 * Pseudo-counts: how many findings the table that one starts from is worth. A class counts for 8, the way its parts fail
 * for 10; one place for 2 and the way it fails for 6, because places do differ, but one finding in one vehicle is little. Chosen, not measured.
 */
const classFindings = 8
const classModeFindings = 10
const siteFindings = 2
const siteModeFindings = 6

/** Places of each class in a circuit, about: the mean of the samples, rounded, and something for what they lack. */
export const typicalPlaces: Readonly<Record<PartClass, number>> = {
  wire: 16,
  contact: 13,
  splice: 3,
  ground: 2.5,
  fuse: 2,
  load: 1,
  resistor: 0.5,
  diode: 0.25,
  'switch-contact': 0.75,
  'relay-coil': 0.6,
  'relay-contact': 0.6,
  pin: 5,
  module: 1,
  battery: 0.25,
  feed: 1.5,
}

/**
 * The odds after these findings, shrunk toward the table they start from. With W the weight of a class (the sum over
 * its modes), n its findings and E those that the table foretells of so many (W times the places of its kind, over the
 * same of all classes), its rate is Gamma–Poisson, W·(a + n) / (a + E), and its modes Dirichlet,
 * (b·p + n_mode) / (b + n) with p the table's part. Single places likewise, over their class.
 *
 * Only sums of counts enter, so the order of findings makes no difference; a and b keep every weight above zero. Give
 * all findings at once: the result is no table to start from again with the same ones.
 */
export function updateOdds(odds: Odds, findings: readonly Finding[]): Odds {
  const known = findings.filter(
    (finding) => finding.count > 0 && (modesOfClass[finding.class] as readonly Mode[]).includes(finding.mode),
  )
  if (known.length === 0) return odds
  const all = sumOf(known)
  let foretold = 0
  for (const name of partClasses) foretold += typicalPlaces[name] * total(weightsOf(name, odds))
  const classes: Odds['classes'] = {}
  for (const name of partClasses) {
    const weights = weightsOf(name, odds)
    const own = known.filter((finding) => finding.class === name)
    const expected = (all * typicalPlaces[name] * total(weights)) / foretold
    classes[name] = shrunk(weights, own, expected, classFindings, classModeFindings)
  }
  const updated: Odds = { classes, sites: { ...odds.sites } }
  const placed = known.filter((finding) => finding.site !== undefined)
  const here = sumOf(placed)
  for (const site of new Set(placed.map((finding) => finding.site!))) {
    const own = placed.filter((finding) => finding.site === site)
    const weights = { ...weightsOf(own[0]!.class, updated), ...odds.sites[site] }
    const expected = (here * total(weights)) / foretold
    updated.sites[site] = shrunk(weights, own, expected, siteFindings, siteModeFindings)
  }
  return updated
}

type Weights = Partial<Record<Mode, number>>

function shrunk(
  weights: Weights,
  findings: readonly Finding[],
  expected: number,
  pseudoCount: number,
  modePseudoCount: number,
): Weights {
  const whole = total(weights)
  const count = sumOf(findings)
  const rate = (whole * (pseudoCount + count)) / (pseudoCount + expected)
  return Object.fromEntries(
    Object.entries(weights).map(([mode, weight]) => {
      const own = sumOf(findings.filter((finding) => finding.mode === mode))
      const part = ((modePseudoCount * weight) / whole + own) / (modePseudoCount + count)
      // Within the bounds of the table, whatever was found.
      return [mode, Math.min(1e6, Math.max(1e-6, rate * part))]
    }),
  )
}

function weightsOf(name: PartClass, odds: Odds): Weights {
  return Object.fromEntries(modesOfClass[name].map((mode) => [mode, classWeight(name, mode, odds)]))
}

function total(weights: Weights): number {
  return Object.values(weights).reduce((sum, weight) => sum + weight, 0)
}

function sumOf(findings: readonly Finding[]): number {
  return findings.reduce((sum, finding) => sum + finding.count, 0)
}
