import { describe, expect, it } from 'vitest'
import { bestByPlayingOut } from '@/diagrams/planner/play-out'
import { costOf, greedy, optimalCost, type Chooser } from './optimal-tree'
import { seededRandom } from './random'

/** Suspect s behind point t: volts at each point of a chain. */
const chain = (suspects: number) =>
  Array.from({ length: suspects - 1 }, (_, t) => Array.from({ length: suspects }, (_, s) => Number(s > t)))

/** The planner's own choice once few places are left: it plays out what would follow. */
const playingOut: Chooser = (suspects, { weights, outcomes, costs = outcomes.map(() => 1) }) => {
  const best = bestByPlayingOut({
    outcomes: outcomes.map((outcome) => suspects.map((s) => outcome[s]!)),
    weights: suspects.map((s) => weights[s]!),
    unitOf: suspects.map((_, i) => i),
    units: suspects.length,
    foundFrom: 1,
    costOf: (test) => costs[test]!,
  })
  return best < 0 ? greedy(suspects, { weights, outcomes, costs }) : best
}

describe('the optimal tree of readings', () => {
  it('needs three readings for eight equal suspects of a chain: 2³ = 8', () => {
    expect(optimalCost({ weights: Array(8).fill(1), outcomes: chain(8) })).toBe(3)
  })

  it('needs 1.5 readings for odds of 2, 1 and 1: Huffman, A method for the construction of minimum-redundancy codes, 1952', () => {
    // Every split is allowed, so the tree is Huffman's: ½·1 + ¼·2 + ¼·2.
    const outcomes = [
      [0, 1, 1],
      [1, 0, 1],
      [1, 1, 0],
    ]
    expect(optimalCost({ weights: [2, 1, 1], outcomes })).toBeCloseTo(1.5, 12)
  })

  it('needs 1.9 readings for odds of 4, 3, 2 and 1 along a chain', () => {
    // By hand: first suspect alone (4), then the second (3), then the rest: 10·1 + 6·1 + 3·1 = 19; or two and two:
    // 10 + 7 + 3 = 20. The first is the cheapest: 1.9.
    expect(optimalCost({ weights: [4, 3, 2, 1], outcomes: chain(4) })).toBeCloseTo(1.9, 12)
  })

  it('takes the cheap reading first where a dear one would tell all', () => {
    // Telling all three at once costs 5; one against two costs 1, and so does the other: 1 + ⅔·1.
    const outcomes = [
      [0, 1, 2],
      [0, 1, 1],
      [0, 0, 1],
    ]
    expect(optimalCost({ weights: [1, 1, 1], outcomes, costs: [5, 1, 1] })).toBeCloseTo(1 + 2 / 3, 12)
  })

  it('costs nothing where no reading tells the suspects apart', () => {
    expect(optimalCost({ weights: [1, 1], outcomes: [[0, 0]] })).toBe(0)
  })

  it('refuses more than twelve suspects', () => {
    expect(() => optimalCost({ weights: Array(13).fill(1), outcomes: chain(13) })).toThrow('13 suspects')
  })

  it('is never dearer than one step of look-ahead, and never cheaper than the entropy of binary readings', () => {
    const random = seededRandom(11)
    const ratios: { stepwise: number; played: number }[] = []
    for (let i = 0; i < 150; i++) {
      const suspects = random.whole(3, 9)
      const weights = Array.from({ length: suspects }, () => random.logUniform(0.1, 10))
      const outcomes = Array.from({ length: random.whole(6, 14) }, () =>
        Array.from({ length: suspects }, () => random.whole(0, 1)),
      )
      // All told apart, or the entropy is no bound.
      const columns = new Set(weights.map((_, s) => outcomes.map((outcome) => outcome[s]).join('')))
      if (columns.size < suspects) continue
      const instance = { weights, outcomes }
      const least = optimalCost(instance)
      const stepwise = costOf(instance, greedy)
      const played = costOf(instance, playingOut)
      const total = weights.reduce((a, b) => a + b, 0)
      const entropy = weights.reduce((bits, w) => bits - (w / total) * Math.log2(w / total), 0)
      expect(least).toBeLessThanOrEqual(stepwise + 1e-9)
      expect(least).toBeLessThanOrEqual(played + 1e-9)
      expect(least).toBeGreaterThanOrEqual(entropy - 1e-9)
      ratios.push({ stepwise: stepwise / least, played: played / least })
    }
    const runs = ratios.length
    const meanOf = (way: 'stepwise' | 'played') => ratios.reduce((sum, ratio) => sum + ratio[way], 0) / runs
    const worstOf = (way: 'stepwise' | 'played') => Math.max(...ratios.map((ratio) => ratio[way]))
    for (const way of ['stepwise', 'played'] as const)
      console.log(
        `${way}: ${meanOf(way).toFixed(4)} of the optimum on average, ${worstOf(way).toFixed(3)} at worst, ${runs} instances`,
      )
    expect(meanOf('played')).toBeLessThan(1.02)
    expect(meanOf('played')).toBeLessThan(meanOf('stepwise'))
    expect(runs).toBeGreaterThan(50)
  })
})
