import type { Circuit } from '../document/circuit-schema'
import type { Reading } from '../document/reading-schema'
import { nodeName } from '../document/points'
import { siteName } from '../document/sites'
import type { Answer, ModeAnswer, SiteAnswer } from './answer'
import { readingPlace, valueWords } from './reading-sentence'

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
      return 'Nothing wrong in the conditions tried.'
    case 'cannot-be': {
      const number = readings.findIndex((reading) => reading.id === answer.reading) + 1
      const reading = readings[number - 1]
      return reading
        ? `R${number} fits no fault in this circuit: ${readingPlace(circuit, reading)}, ${valueWords(reading.kind, reading.value)}. Check the leads and the condition and take it again.`
        : 'These readings fit no single fault in this circuit.'
    }
    case 'two-faults':
      return 'Two faults stand together here; no single one gives these readings.'
    case 'narrowed': {
      const left = answer.sites.filter((site) => site.verdict !== 'proved-good')
      const likeliest = left.slice(0, 3).map((site) => siteName(circuit, site.site))
      return `${left.length} ${left.length === 1 ? 'place' : 'places'} left of ${answer.sites.length}. Most likely: ${likeliest.join('; ')}.`
    }
  }
}

function locatedSentence(
  circuit: Circuit,
  readings: readonly Reading[],
  answer: Omit<Answer, 'says'>,
): string {
  const faulty = answer.sites.filter((site) => site.verdict === 'faulty')
  const first = faulty[0]!
  const mode = first.modes[0]!
  const sentences = [
    `${modeWords(circuit, mode, first.site)} ${siteName(circuit, first.site)}${severityWords(mode)}.`,
  ]
  if (mode.blows.length > 0)
    sentences.push(
      `It has blown ${mode.blows.map((id) => fuseName(circuit, id)).join(' and ')}: the short is the cause, the fuse the consequence.`,
    )
  const contrast = contrastWords(circuit, readings)
  if (contrast) sentences.push(contrast)
  if (faulty.length > 1)
    sentences.push(
      `${listWords(faulty.map((site) => siteName(circuit, site.site)))} cannot be told apart by any reading.`,
    )
  const module = moduleCondemned(faulty)
  if (module) sentences.push('Before the module is renewed, prove its feeds and grounds.')
  return sentences.join(' ')
}

function moduleCondemned(faulty: readonly SiteAnswer[]): boolean {
  return faulty.some((site) => site.site.startsWith('pin:') || site.site.startsWith('module:'))
}

function fuseName(circuit: Circuit, id: string): string {
  const node = circuit.nodes.find((n) => n.id === id)
  return node ? nodeName(node) : id
}

function modeWords(circuit: Circuit, mode: ModeAnswer, site: string): string {
  const at = site.startsWith('wire:') ? 'in' : 'at'
  switch (mode.mode) {
    case 'open':
    case 'stuck-open':
      return `Open ${at}`
    case 'resistive':
      return site.startsWith('contact:') || at === 'in' ? `Bad joint ${at}` : `High resistance ${at}`
    case 'short-to-ground':
      return `Short to ground ${at}`
    case 'short-to-supply':
      return `Short to supply ${at}`
    case 'short-to-wire':
      return `Short to ${mode.other ? siteName(circuit, `wire:${mode.other}`) : 'another wire'} ${at}`
    case 'shorted':
      return 'Shorted inside:'
    case 'blown':
      return 'Blown:'
    case 'weak':
      return 'Weak:'
    case 'stuck-closed':
      return 'Stuck closed:'
    case 'dead':
      return 'Dead:'
    case 'stuck-on':
      return 'Stuck on:'
  }
}

function severityWords(mode: ModeAnswer): string {
  return mode.ohms === null || mode.mode !== 'resistive' ? '' : `, about ${valueWords('ohms', mode.ohms)}`
}

/** The two volt readings of one condition that differ most: what goes in and what comes out. */
function contrastWords(circuit: Circuit, readings: readonly Reading[]): string {
  const volts = readings.flatMap((reading) =>
    reading.kind === 'volts' && reading.black === 'chassis' && typeof reading.value === 'number'
      ? [{ reading, value: reading.value }]
      : [],
  )
  let best: { high: (typeof volts)[number]; low: (typeof volts)[number] } | null = null
  for (const high of volts)
    for (const low of volts) {
      if (JSON.stringify(high.reading.condition) !== JSON.stringify(low.reading.condition)) continue
      if (high.value - low.value > Math.max(0.3, best ? best.high.value - best.low.value : 0))
        best = { high, low }
    }
  if (!best) return ''
  const words = ({ reading, value }: (typeof volts)[number]) =>
    `${valueWords('volts', value)} at ${readingPlace(circuit, reading)}`
  return `${words(best.high)}, ${words(best.low)}.`
}

function listWords(names: readonly string[]): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`
}
