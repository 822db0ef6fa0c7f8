import type { Reading } from '../document/reading-schema'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import { hiddenPairs, showingMembers, type PairMember, type WeightOf } from './pair-member'

/** Two faults that might explain together what neither explains alone. */
export interface CandidatePair {
  a: PairMember
  b: PairMember
  /** Readings that neither explains by itself; the two together still may. */
  missing: number
}

/** On the largest circuits the rarest faults are not paired: every two of these are compared. */
const mostMembers = 1500

/**
 * The pairs most worth solving, at most so many: those come first of which each explains what the other does
 * not, the likelier before the others.
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
  const members = shown
    .map((member) => ({ ...member, share: scale * member.share }))
    .toSorted((a, b) => b.share - a.share)
    .slice(0, mostMembers)
  const masks = new MaskList(readings.length)
  const masksOf = members.map((member) =>
    widest(
      member.hypotheses.flatMap((h) =>
        model.hypotheses[h]!.cells.map((_, c) => explainedBy(evidence, h, c, readings.length)),
      ),
    ).map((mask) => masks.number(mask)),
  )
  const missing = masks.missingTogether()
  const foremost = new Foremost(most)
  for (let i = 0; i < members.length; i++)
    for (let j = i + 1; j < members.length; j++) {
      if (!mayStandTogether(members[i]!, members[j]!)) continue
      let fewest = readings.length
      for (const x of masksOf[i]!) for (const y of masksOf[j]!) fewest = Math.min(fewest, missing[x]![y]!)
      foremost.add(members[i]!, members[j]!, fewest)
    }
  return foremost.list()
}

/** Pairs that show only together, likelier ones first: asked where no other pair explains the readings. */
export function hiddenCandidates(model: FaultModel, weightOf: WeightOf, missing: number): CandidatePair[] {
  const shown = showingMembers(model, weightOf)
  const scale = 1 / shown.reduce((sum, member) => sum + member.share, 0)
  const pairs = hiddenPairs(model, weightOf, scale)
  const foremost = new Foremost(Math.max(1, pairs.length))
  for (const [a, b] of pairs) foremost.add(a, b, missing)
  return foremost.list()
}

/** The first so many pairs by readings explained, then by odds; never holds many more. */
class Foremost {
  private kept: CandidatePair[] = []
  /** What explains less than this is behind enough others already. */
  private limit = Infinity

  constructor(private readonly most: number) {}

  add(a: PairMember, b: PairMember, missing: number) {
    if (missing > this.limit) return
    this.kept.push({ a, b, missing })
    if (this.kept.length < 4 * this.most) return
    this.kept = this.list()
    this.limit = this.kept.at(-1)!.missing
  }

  list(): CandidatePair[] {
    const odds = ({ a, b }: CandidatePair) => a.share * b.share
    return this.kept.toSorted((x, y) => x.missing - y.missing || odds(y) - odds(x)).slice(0, this.most)
  }
}

/** A place has one fault, and a branch is altered once. */
function mayStandTogether(a: PairMember, b: PairMember): boolean {
  if (a.site === b.site || (a.mode === 'weak' && b.mode === 'weak')) return false
  if (a.alteration.series.some((branch) => b.alteration.series.includes(branch))) return false
  // One short between two wires is met from either of them.
  return !(a.mode === 'short-to-wire' && b.mode === 'short-to-wire' && a.other === b.site.slice(5))
}

/** The readings that a cell gives, each taken by itself. */
function explainedBy(evidence: Evidence, hypothesis: number, cell: number, readings: number): Uint32Array {
  const mask = new Uint32Array(Math.ceil(readings / 32))
  for (let r = 0; r < readings; r++)
    if (evidence.fits(hypothesis, cell, (one) => one === r)) mask[r >> 5]! |= 1 << (r & 31)
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
