import type { Circuit } from '../document/circuit-schema'
import { conditionParts } from '../document/condition-words'
import { nodeName, pointName } from '../document/points'
import type { Reading } from '../document/reading-schema'
import { siteName } from '../document/sites'
import { alikeWords, ofOneModule } from './alike-words'
import type { Answer, ModeAnswer, SiteAnswer } from './answer'
import { atSite, faultWords, modeNoun } from './fault-words'
import { misfitSentence } from './misfit-sentence'
import { moduleWords } from './module-words'
import { pairSentence } from './pair-sentence'
import { stretchLeft } from './stretch-left'
import { listWords, percentWords } from './value-words'
import { whyWords } from './why-words'

/** A second way to fail is worth a word from this share of the place's probability, and a place in the head from this one. */
const otherModeFrom = 0.1
const eitherModeFrom = 0.3

/** The verdict in plain sentences: place first, then what, then why. */
export function verdictSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  answer: Omit<Answer, 'says'>,
): string {
  switch (answer.outcome) {
    case 'located':
      return locatedSentence(circuit, readings, answer)
    case 'no-fault':
      return noFaultSentence(circuit, readings, answer)
    case 'cannot-be':
      return misfitSentence(circuit, readings, answer.readings, answer.reading)
    case 'two-faults':
      return pairSentence(circuit, readings, answer)
    case 'narrowed':
      return narrowedSentence(circuit, readings, answer)
  }
}

function locatedSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  answer: Omit<Answer, 'says'>,
): string {
  const faulty = answer.sites.filter((site) => site.verdict === 'faulty')
  const first = faulty[0]!
  const [mode, other] = first.modes as [ModeAnswer, ModeAnswer?]
  const sentences = [
    `${eitherWay(circuit, first) ?? faultWords(circuit, first.site, mode)}.`,
    blownWords(circuit, mode),
    whyWords(circuit, readings, answer.readings, first.site, mode.mode),
    eitherWay(circuit, first) === null && other && other.probability > otherModeFrom * first.probability
      ? `Less likely: ${modeNoun(circuit, first.site, other.mode)}, ${percentWords(other.probability)}.`
      : '',
    // Two wires that touch are one fault, and the first sentence names both.
    faulty.length > 1 && !isOneContact(faulty) ? alikeWords(circuit, faulty) : '',
    faulty.length > 1 &&
    ofOneModule(
      circuit,
      faulty.map((site) => site.site),
    )
      ? ''
      : moduleWords(circuit, answer.sites),
  ]
  return sentences.filter(Boolean).join(' ')
}

/** "Open or bad joint at G3", where the readings leave both: nobody knows then how bad the joint would be. */
function eitherWay(circuit: Circuit, { site, modes }: SiteAnswer): string | null {
  const [one, two] = modes
  if (!one || !two || two.probability < eitherModeFrom * one.probability) return null
  const both = new Set([one.mode, two.mode])
  const breaks = (['open', 'blown', 'stuck-open'] as const).find((mode) => both.has(mode))
  if (!breaks || !both.has('resistive')) return null
  return `${breaks === 'blown' ? 'Blown' : 'Open'} or ${modeNoun(circuit, site, 'resistive')} ${atSite(circuit, site)}`
}

function isOneContact(faulty: readonly SiteAnswer[]): boolean {
  const [one, two, ...more] = faulty
  return (
    more.length === 0 &&
    one!.modes[0]?.mode === 'short-to-wire' &&
    `wire:${one!.modes[0].other}` === two?.site
  )
}

function blownWords(circuit: Circuit, mode: ModeAnswer): string {
  if (mode.blows.length === 0) return ''
  const fuses = mode.blows.map((id) => circuit.nodes.find((node) => node.id === id))
  const names = listWords(fuses.map((fuse, i) => (fuse ? nodeName(fuse) : mode.blows[i]!)))
  return `It has blown ${names}: the short is the cause, the fuse the consequence.`
}

function noFaultSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  answer: Omit<Answer, 'says'>,
): string {
  // Without a source, or on next to no volts.
  if (answer.sites.every((site) => site.modes.length === 0))
    return 'No fault of this circuit would show: nothing in it drives a current in any ordinary condition.'
  const tried = [
    ...new Set(
      readings.map(({ condition }) => listWords(conditionParts(circuit, condition)) || 'everything at rest'),
    ),
  ]
  const agree = answer.readings.filter((reading) => reading.agrees).length
  const said =
    tried.length > 0
      ? `Nothing wrong in the conditions tried: ${tried.join('; ')}.`
      : 'Nothing wrong in the conditions tried.'
  const all =
    agree === 1 ? '1 reading is as in a good circuit.' : `${agree} readings are as in a good circuit.`
  return `${said} ${all} A fault that shows at other times is not ruled out.`
}

function narrowedSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  answer: Omit<Answer, 'says'>,
): string {
  const left = answer.sites.filter((site) => site.verdict !== 'proved-good')
  const count = `${left.length} ${left.length === 1 ? 'place' : 'places'} left of ${answer.sites.length}`
  if (left.length === 0) return `${count}.`
  if (left.length === 1) {
    const [only] = left as [SiteAnswer]
    const why = whyWords(circuit, readings, answer.readings, only.site, only.modes[0]?.mode ?? 'open')
    return `${count}: ${likely(circuit, only)}. ${why ? `${why} ` : ''}Take one more reading there, of another kind, before anything is renewed.`
  }
  const between = stretchLeft(circuit, new Set(left.map((site) => site.site)))
  const lie = between
    ? ` All are between ${between.map((point) => pointOrModule(circuit, point)).join(' and ')}.`
    : ''
  const most = left.slice(0, between ? 1 : 3).map((site) => likely(circuit, site))
  const group = alikeAmong(answer)
  return `${count}.${lie} Most likely: ${most.join('; ')}.${group ? ` ${alikeWords(circuit, group)}` : ''}`
}

function likely(circuit: Circuit, site: SiteAnswer): string {
  return `${siteName(circuit, site.site)}, ${percentWords(site.probability)}`
}

/** A group that no reading tells apart and that holds most of the odds: further splitting ends in it. */
function alikeAmong(answer: Omit<Answer, 'says'>): SiteAnswer[] | null {
  for (const group of answer.inseparable) {
    const sites = answer.sites.filter((site) => group.includes(site.site) && site.verdict !== 'proved-good')
    if (sites.length > 1 && sites.reduce((sum, site) => sum + site.probability, 0) > 0.5) return sites
  }
  return null
}

function pointOrModule(circuit: Circuit, point: string): string {
  const module = circuit.nodes.find((node) => node.id === point)
  return module ? nodeName(module) : pointName(circuit, point).replace(/, part side$/, '')
}
