import type { Circuit } from '../document/circuit-schema'
import { siteName } from '../document/sites'
import type { Outcome, SiteAnswer } from './answer'
import { modeNoun } from './fault-words'
import { aboutOhms, capital, listWords, percentWords, readingNames } from './value-words'

/** Modes rarer than this are not named. */
const leastMode = 0.005
const mostModes = 3
const withdrawnBy: Partial<Record<Outcome, string>> = {
  'cannot-be': ' Nothing is proved good while a reading fits no fault.',
  'two-faults': ' Nothing is proved good while there are two faults.',
}

/**
 * How one place stands and why: "F14 proved good by R2, if there is one fault and no reading is wrong.",
 * "C12 cavity 3 in question, 41 % likely: open 30 %, bad joint 11 %."
 */
export function siteSentence(
  circuit: Circuit,
  readings: readonly { id: string }[],
  outcome: Outcome,
  site: Omit<SiteAnswer, 'says'>,
): string {
  const name = capital(keptName(circuit, site.site))
  if (readings.length === 0) return `${name}: no reading yet.`
  if (site.verdict === 'proved-good') {
    if (site.clearedBy.length === 0) return `${name} proved good: no fault of it would show in this circuit.`
    const by = listWords(readingNames(readings, site.clearedBy))
    return site.firm
      ? `${name} proved good by ${by}, if there is one fault. It holds with any one reading left out.`
      : `${name} proved good by ${by}, if there is one fault and no reading is wrong.`
  }
  const withdrawn = withdrawnBy[outcome] ?? ''
  const modes = modesWords(circuit, site)
  const ways = modes ? `: ${modes}` : ''
  if (site.verdict === 'faulty') return `${name} faulty, ${percentWords(site.probability)} likely${ways}.`
  return `${name} in question, ${percentWords(site.probability)} likely${ways}.${withdrawn}`
}

function modesWords(circuit: Circuit, site: Omit<SiteAnswer, 'says'>): string {
  // Where it may as well be open, how bad the joint is nobody knows.
  const open = site.modes.find((mode) => mode.mode === 'open')?.probability ?? 0
  const known = open < 0.1 * site.probability
  return site.modes
    .filter((mode) => mode.probability > leastMode)
    .slice(0, mostModes)
    .map((mode) => {
      const about =
        mode.ohms === null || mode.mode !== 'resistive' || !known ? '' : ` of ${aboutOhms(mode.ohms)}`
      return `${modeNoun(circuit, site.site, mode.mode)}${about} ${percentWords(mode.probability)}`
    })
    .join(', ')
}

/** Names of places by circuit: asked for every place with every reading, of a document that does not change. */
const namesByCircuit = new WeakMap<Circuit, Map<string, string>>()

function keptName(circuit: Circuit, site: string): string {
  let names = namesByCircuit.get(circuit)
  if (!names) namesByCircuit.set(circuit, (names = new Map()))
  let name = names.get(site)
  if (name === undefined) names.set(site, (name = siteName(circuit, site)))
  return name
}
