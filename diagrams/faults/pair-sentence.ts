import type { Circuit } from '../document/circuit-schema'
import { siteName } from '../document/sites'
import type { Answer, PairAnswer } from './answer'
import { faultWords } from './fault-words'
import { moduleWords } from './module-words'
import { fewWords, listWords, percentWords, readingNames } from './value-words'

const mostNamed = 3

/**
 * "Two faults. A: F12 has blown. B: Bad joint at G6, about 1.8 ohm. R2 and R3 speak of A, R5 of B. No single fault gives
 * these readings together."
 */
export function pairSentence(
  circuit: Circuit,
  readings: readonly { id: string }[],
  answer: Omit<Answer, 'says'>,
): string {
  const pair = answer.pairs?.[0]
  if (!pair) return 'Two faults stand together here; no single one gives these readings.'
  return [
    'Two faults.',
    `A: ${oneOf(circuit, answer, pair, 0)}.`,
    `B: ${oneOf(circuit, answer, pair, 1)}.`,
    speakers(readings, pair),
    'No single fault gives these readings together.',
    moduleWords(circuit, answer.sites),
  ]
    .filter(Boolean)
    .join(' ')
}

/** One of the two as it most likely is, and how sure that is. */
function oneOf(circuit: Circuit, answer: Omit<Answer, 'says'>, pair: PairAnswer, which: 0 | 1): string {
  const id = pair.sites[which]
  const site = answer.sites.find((one) => one.site === id)!
  const mode = site.modes.find((one) => one.mode === pair.modes[which])
  const fault = { mode: pair.modes[which], ohms: pair.ohms[which], other: mode?.other ?? null }
  const what = faultWords(circuit, id, fault).replace(': about', ', about')
  const group = answer.inseparable.find((places) => places.includes(id)) ?? [id]
  const others = group.filter((place) => place !== id).map((place) => siteName(circuit, place))
  const alike = others.length > 0 ? `, or ${fewWords(others, mostNamed)}, which no reading tells from it` : ''
  return site.verdict === 'faulty'
    ? `${what}${alike}`
    : `${what}${alike}, ${percentWords(groupShare(answer, group))} likely`
}

function groupShare(answer: Omit<Answer, 'says'>, group: readonly string[]): number {
  const shares = answer.sites.filter((site) => group.includes(site.site)).map((site) => site.probability)
  return Math.min(
    1,
    shares.reduce((sum, share) => sum + share, 0),
  )
}

function speakers(readings: readonly { id: string }[], pair: PairAnswer): string {
  const [a, b] = pair.readings.map((ids) => readingNames(readings, ids))
  // Readings that need both are no use for telling which speaks of which.
  const onlyA = a!.filter((name) => !b!.includes(name))
  const onlyB = b!.filter((name) => !a!.includes(name))
  const parts = [
    onlyA.length > 0 ? `${listWords(onlyA)} ${onlyA.length === 1 ? 'speaks' : 'speak'} of A` : '',
    onlyB.length > 0 ? `${listWords(onlyB)} ${onlyB.length === 1 ? 'speaks' : 'speak'} of B` : '',
  ].filter(Boolean)
  return parts.length > 0 ? `${parts.join(', ')}.` : ''
}
