import type { Reading } from '../document/reading-schema'
import type { ModeAnswer, PairAnswer } from './answer'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { PairMember } from './pair-member'
import type { FittingBox, PairSearch } from './pair-search'

/** A box seen from one of its two faults. */
interface Part {
  member: PairMember
  low: number
  high: number
  blown: readonly string[]
  probability: number
}

/** Probability of every pair of places, likeliest first; each with its boxes, likeliest first. */
export interface PairOdds {
  sites: [string, string]
  probability: number
  boxes: FittingBox[]
}

export function pairOdds({ boxes, logEvidence }: PairSearch): PairOdds[] {
  const found = new Map<string, PairOdds>()
  for (const box of boxes) {
    const sites = [box.pair.held.site, box.pair.swept.site].toSorted() as [string, string]
    const key = sites.join(' ')
    const pair = found.get(key) ?? { sites, probability: 0, boxes: [] }
    found.set(key, pair)
    pair.probability += Math.exp(box.log - logEvidence)
    pair.boxes.push(box)
  }
  return [...found.values()].toSorted((x, y) => y.probability - x.probability)
}

/** Each site's own probability over the pairs; they sum to 2. */
export function siteShares(pairs: readonly PairOdds[]): Map<string, number> {
  const found = new Map<string, number>()
  for (const { sites, probability } of pairs)
    for (const site of sites) found.set(site, (found.get(site) ?? 0) + probability)
  return found
}

/** The ways in which a site may be at fault in the pairs, most probable first. */
export function pairModes(site: string, { boxes, logEvidence }: PairSearch): ModeAnswer[] {
  const found = new Map<string, ModeAnswer & { heaviest: number }>()
  for (const box of boxes) {
    const probability = Math.exp(box.log - logEvidence)
    for (const part of partsOf(box, probability)) {
      if (part.member.site !== site) continue
      const { mode, other = null } = part.member
      const key = `${mode} ${other}`
      const entry = found.get(key) ?? { mode, probability: 0, ohms: null, other, blows: [], heaviest: -1 }
      found.set(key, entry)
      entry.probability += probability
      if (probability <= entry.heaviest) continue
      entry.heaviest = probability
      entry.ohms = ohmsOf(part)
      // The fuses are the consequence of the short, not of what stands beside it.
      entry.blows = mode.startsWith('short') ? [...part.blown] : []
    }
  }
  return [...found.values()]
    .toSorted((x, y) => y.probability - x.probability)
    .map(({ heaviest: _, ...mode }) => mode)
}

const mostPairs = 5

/** The likeliest pairs, the place with the greater probability of its own first. */
export function pairAnswers(
  model: FaultModel,
  pairs: readonly PairOdds[],
  evidence: Evidence,
  readings: readonly Reading[],
): PairAnswer[] {
  const shares = siteShares(pairs)
  return pairs.slice(0, mostPairs).map(({ sites, probability, boxes }) => {
    const parts = partsOf(boxes[0]!, probability)
    const first = shares.get(sites[0])! >= shares.get(sites[1])! ? sites[0] : sites[1]
    const [a, b] = parts[0].member.site === first ? parts : [parts[1], parts[0]]
    const needs = (other: Part) =>
      readings.flatMap((reading, r) => (explains(model, evidence, other, r) ? [] : [reading.id]))
    return {
      sites: [a.member.site, b.member.site],
      modes: [a.member.mode, b.member.mode],
      ohms: [ohmsOf(a), ohmsOf(b)],
      // What speaks of a fault is what the other one alone would not show.
      readings: [needs(b), needs(a)],
      probability,
    }
  })
}

function partsOf({ pair, held, swept }: FittingBox, probability: number): [Part, Part] {
  const { blown } = pair
  return [
    { member: pair.held, low: held[0], high: held[1], blown, probability },
    { member: pair.swept, low: swept[0], high: swept[1], blown, probability },
  ]
}

function ohmsOf({ member: { mode }, low, high }: Part): number | null {
  return mode === 'resistive' || mode.startsWith('short') ? Math.sqrt(low * high) : null
}

/** Whether one fault alone, at these severities, gives a reading. */
function explains(model: FaultModel, evidence: Evidence, part: Part, reading: number): boolean {
  const { hypotheses } = part.member
  const only = (one: number) => one === reading
  if (hypotheses.length === 0) return evidence.fits(-1, 0, only)
  return hypotheses.some((h) =>
    model.hypotheses[h]!.cells.some(
      (cell, c) => cell.low <= part.high && cell.high >= part.low && evidence.fits(h, c, only),
    ),
  )
}
