import { describe, expect, it } from 'vitest'
import { bestByPlayingOut, type Game } from '@/diagrams/planner/play-out'

/** Four suspects alike. Readings 0 and 1 halve them, and lie behind one connector; 2, 3 and 4 set one apart each. */
const game = (connector: number, apart: number): Game => ({
  outcomes: [
    [0, 0, 1, 1],
    [0, 1, 0, 1],
    [1, 0, 0, 0],
    [0, 1, 0, 0],
    [0, 0, 1, 0],
  ],
  weights: [0.25, 0.25, 0.25, 0.25],
  unitOf: [0, 1, 2, 3],
  units: 4,
  foundFrom: 0.95,
  costOf: (reading, path) => (reading > 1 ? apart : path.some((taken) => taken < 2) ? 1 : connector),
})

describe('playing out what follows a reading', () => {
  it('pays the way to a connector once, which bits for one reading’s cost do not see', () => {
    // Through the connector: 5 + 1 = 6. One after the other: 3 + ¾·3 + ½·3 = 6.75, though the first of them
    // brings 0.81 bit for 3, more than 1 bit for 5.
    expect(bestByPlayingOut(game(5, 3))).toBeLessThan(2)
  })

  it('leaves the connector shut where it is too dear', () => {
    // 7 + 1 = 8 against 6.75.
    expect(bestByPlayingOut(game(7, 3))).toBeGreaterThan(1)
  })

  it('asks for nothing where no reading tells the suspects apart, or they are one place', () => {
    expect(bestByPlayingOut({ ...game(5, 3), outcomes: [[0, 0, 0, 0]] })).toBe(-1)
    expect(bestByPlayingOut({ ...game(5, 3), unitOf: [0, 0, 0, 0], units: 1 })).toBe(-1)
  })

  it('takes nothing from a reading that foretells nothing', () => {
    expect(
      bestByPlayingOut({
        ...game(5, 3),
        outcomes: [
          [-1, -1, -1, -1],
          [0, 0, 1, 1],
        ],
      }),
    ).toBe(1)
  })
})
