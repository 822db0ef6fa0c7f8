import type { Reading } from '../document/reading-schema'
import type { CellEvidence, Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import { hiddenPairs, showingMembers, type PairMember, type WeightOf } from './pair-member'

/** Two faults that might explain together what neither explains alone. */
export interface CandidatePair {
  a: PairMember
  b: PairMember
  /** Readings that neither explains by itself; the two together still may. */
  missing: number
}

/**
 * The pairs most worth solving, at most so many: those come first of which each explains what the other does
 * not, the likelier before the others. The last fifth of the room is kept for pairs that show only together.
 */
export function candidatePairs(
  model: FaultModel,
  evidence: Evidence,
  readings: readonly Reading[],
  weightOf: WeightOf,
  most: number,
): CandidatePair[] {
  const shown = showingMembers(model, weightOf)
  const scale = 1 / shown.reduce((sum, member) => sum + member.share, 0)
  const members = shown.map((member) => ({ ...member, share: scale * member.share }))
  const masks = new MaskList(readings.length)
  const masksOf = members.map((member) =>
    widest(member.hypotheses.flatMap((h) => evidence.cells[h]!.map(explained))).map((mask) =>
      masks.number(mask),
    ),
  )
  const missing = masks.missingTogether()
  const ranked: CandidatePair[] = []
  for (let i = 0; i < members.length; i++)
    for (let j = i + 1; j < members.length; j++) {
      if (!mayStandTogether(members[i]!, members[j]!)) continue
      let fewest = readings.length
      for (const x of masksOf[i]!) for (const y of masksOf[j]!) fewest = Math.min(fewest, missing[x]![y]!)
      ranked.push({ a: members[i]!, b: members[j]!, missing: fewest })
    }
  const hidden = hiddenPairs(model, weightOf, scale).map(([a, b]) => ({ a, b, missing: readings.length }))
  const room = Math.max(Math.ceil(0.8 * most), most - hidden.length)
  return [...foremost(ranked, room), ...foremost(hidden, most - Math.min(room, ranked.length))]
}

/** The first so many by readings explained, then by odds. */
function foremost(pairs: readonly CandidatePair[], most: number): CandidatePair[] {
  const odds = ({ a, b }: CandidatePair) => a.share * b.share
  const byMissing = new Map<number, CandidatePair[]>()
  for (const pair of pairs) {
    const list = byMissing.get(pair.missing)
    if (list) list.push(pair)
    else byMissing.set(pair.missing, [pair])
  }
  const found: CandidatePair[] = []
  for (const missing of [...byMissing.keys()].toSorted((x, y) => x - y)) {
    if (found.length >= most) break
    const list = byMissing.get(missing)!.toSorted((x, y) => odds(y) - odds(x))
    found.push(...list.slice(0, most - found.length))
  }
  return found
}

/** A place has one fault, and a branch is altered once. */
function mayStandTogether(a: PairMember, b: PairMember): boolean {
  if (a.site === b.site || (a.mode === 'weak' && b.mode === 'weak')) return false
  if (a.alteration.series.some((branch) => b.alteration.series.includes(branch))) return false
  // One short between two wires is met from either of them.
  return !(a.mode === 'short-to-wire' && b.mode === 'short-to-wire' && a.other === b.site.slice(5))
}

function explained(cell: CellEvidence): Uint32Array {
  const mask = new Uint32Array(Math.ceil(cell.fits.length / 32))
  cell.fits.forEach((fits, r) => {
    if (fits.size > 0) mask[r >> 5]! |= 1 << (r & 31)
  })
  return mask
}

/** The sets that lie in no other one. */
function widest(masks: readonly Uint32Array[]): Uint32Array[] {
  const inside = (x: Uint32Array, y: Uint32Array) => x.every((word, w) => (word & ~y[w]!) === 0)
  const kept: Uint32Array[] = []
  for (const mask of masks) {
    if (kept.some((other) => inside(mask, other))) continue
    for (let k = kept.length - 1; k >= 0; k--) if (inside(kept[k]!, mask)) kept.splice(k, 1)
    kept.push(mask)
  }
  return kept
}

/** Sets of readings, each kept once. */
class MaskList {
  private readonly numbers = new Map<string, number>()
  private readonly masks: Uint32Array[] = []

  constructor(private readonly readings: number) {}

  number(mask: Uint32Array): number {
    const key = mask.join()
    let found = this.numbers.get(key)
    if (found === undefined) {
      this.numbers.set(key, (found = this.masks.length))
      this.masks.push(mask)
    }
    return found
  }

  /** How many readings lie in neither of two sets, for every two. */
  missingTogether(): Uint16Array[] {
    return this.masks.map((x) =>
      Uint16Array.from(this.masks, (y) => {
        let together = 0
        for (let w = 0; w < x.length; w++) together += bitsIn(x[w]! | y[w]!)
        return this.readings - together
      }),
    )
  }
}

function bitsIn(word: number): number {
  let count = 0
  for (let left = word >>> 0; left !== 0; left = (left & (left - 1)) >>> 0) count++
  return count
}
