import type { Verdict } from '@/diagrams/faults/answer'

export interface RuleLeg {
  name: string
  sites: readonly string[]
}

/** What the rule knows of a place; `null` before the first reading. */
export interface RulePlace {
  verdict: Verdict
  probability: number
}

export type RuleEntry =
  | { kind: 'good'; sites: string[]; width: number }
  | { kind: 'cell'; site: string; verdict: 'faulty' | 'in-question'; width: number }
  | { kind: 'unmarked'; sites: string[]; width: number }

export interface RuleLegLayout {
  name: string
  entries: RuleEntry[]
  width: number
  left: number
}

export interface RuleLayout {
  legs: RuleLegLayout[]
  /** Places left that did not fit, likeliest first: behind the last cell. */
  more: string[]
  moreWidth: number
}

const cellLeast = 44
/** Narrower than this a name is cut short too early to help. */
const cellWished = 66
export const legGap = 12
const moreWidth = 96

/**
 * Widths of the rule in px. Places left are drawn wide, by their share of probability and 44 px at least; places
 * proved good narrow to a few px each. Cells that do not fit, the least likely ones, go behind "and 6 more".
 */
export function layRule(
  legs: readonly RuleLeg[],
  places: ReadonlyMap<string, RulePlace> | null,
  width: number,
): RuleLayout {
  const shown = legs.filter((leg) => leg.sites.length > 0)
  const room = width - legGap * Math.max(0, shown.length - 1)
  const all = shown.reduce((sum, leg) => sum + leg.sites.length, 0)
  if (!places) {
    const each = all === 0 ? 0 : room / all
    return {
      legs: shown.map(({ name, sites }) => ({
        name,
        left: 0,
        width: each * sites.length,
        entries: [{ kind: 'unmarked', sites: [...sites], width: each * sites.length }],
      })),
      more: [],
      moreWidth: 0,
    }
  }
  const isLeft = (site: string) => (places.get(site)?.verdict ?? 'in-question') !== 'proved-good'
  const left = shown
    .flatMap((leg) => leg.sites)
    .filter(isLeft)
    .toSorted((one, other) => chance(places, other) - chance(places, one))
  const goodCount = all - left.length
  const goodEach = goodCount === 0 ? 0 : Math.min(20, Math.max(2, (room * 0.3) / goodCount))
  const cellRoom = left.length === 0 ? 0 : room - goodEach * goodCount
  const fits = Math.max(1, Math.floor(cellRoom / cellLeast))
  const wished = Math.max(1, Math.floor((cellRoom - moreWidth) / cellWished))
  const kept =
    left.length <= fits && left.length <= wished * 1.6 ? left.length : Math.min(left.length, wished)
  const cells = new Set(left.slice(0, kept))
  const more = left.slice(kept)
  const forCells = cellRoom - (more.length > 0 ? moreWidth : 0)
  const widths = shareWidths([...cells], places, forCells)
  const goodWidth = left.length === 0 && goodCount > 0 ? room / goodCount : goodEach
  return {
    legs: shown
      .map(({ name, sites }) => {
        const entries: RuleEntry[] = []
        for (const site of sites) {
          if (!isLeft(site)) {
            const last = entries.at(-1)
            if (last?.kind === 'good') {
              last.sites.push(site)
              last.width += goodWidth
            } else entries.push({ kind: 'good', sites: [site], width: goodWidth })
          } else if (cells.has(site))
            entries.push({
              kind: 'cell',
              site,
              verdict: places.get(site)?.verdict === 'faulty' ? 'faulty' : 'in-question',
              width: widths.get(site) ?? cellLeast,
            })
        }
        return {
          name,
          entries,
          width: entries.reduce((sum, entry) => sum + entry.width, 0),
          left: sites.filter(isLeft).length,
        }
      })
      .filter((leg) => leg.entries.length > 0),
    more,
    moreWidth: more.length > 0 ? moreWidth : 0,
  }
}

/** How far from the rule's left end a place's cell begins. */
export function placeOnRule(layout: RuleLayout, site: string): number | null {
  let at = 0
  for (const leg of layout.legs) {
    for (const entry of leg.entries) {
      if (entry.kind === 'cell' && entry.site === site) return at
      at += entry.width
    }
    at += legGap
  }
  return null
}

/** Shares by probability, none under the least width: what the small ones lack is taken from the large ones. */
function shareWidths(
  sites: readonly string[],
  places: ReadonlyMap<string, RulePlace>,
  room: number,
): Map<string, number> {
  const widths = new Map<string, number>()
  let open = [...sites]
  let left = room
  for (;;) {
    const total = open.reduce((sum, site) => sum + Math.max(chance(places, site), 1e-9), 0)
    const least = Math.min(cellLeast * 1.4, room / Math.max(1, sites.length))
    const small = open.filter((site) => (Math.max(chance(places, site), 1e-9) / total) * left < least)
    if (small.length === 0 || small.length === open.length) {
      const even = small.length === open.length
      for (const site of open)
        widths.set(site, even ? left / open.length : (Math.max(chance(places, site), 1e-9) / total) * left)
      return widths
    }
    for (const site of small) {
      widths.set(site, least)
      left -= least
    }
    open = open.filter((site) => !small.includes(site))
  }
}

function chance(places: ReadonlyMap<string, RulePlace>, site: string): number {
  return places.get(site)?.probability ?? 0
}
