import { describe, expect, it } from 'vitest'
import { orderElimination } from '@/diagrams/solver/elimination-order'
import { factorise, solveInPlace } from '@/diagrams/solver/factor'
import { fraction, minus, plus, solveExactly, toNumber, type Fraction } from '@/tests/support/exact'
import { seededRandom } from '@/tests/support/random'

interface Grid {
  size: number
  /** From, to (−1: chassis), siemens. */
  edges: [number, number, number][]
  leak: number
}

function here({ size, edges, leak }: Grid, amps: readonly number[]): Float64Array {
  const inner = edges.filter(([, b]) => b >= 0)
  const order = orderElimination(
    size,
    inner.map(([a, b]) => [a, b]),
  )
  const edge = new Float64Array(order.neighbour.length)
  const toChassis = new Float64Array(size).fill(leak)
  for (const [a, b, siemens] of edges)
    if (b < 0) toChassis[a]! += siemens
    else edge[order.slotOf(a, b)]! += siemens
  return solveInPlace(factorise(order, edge, toChassis), Float64Array.from(amps))
}

/** The same equations in whole numbers, rounded once at the end. */
function exactly({ size, edges, leak }: Grid, amps: readonly number[]): number[] {
  const matrix: Fraction[][] = Array.from({ length: size }, (_, i) =>
    Array.from({ length: size }, (_, j) => fraction(i === j ? leak : 0)),
  )
  const add = (i: number, j: number, x: Fraction) => (matrix[i]![j] = plus(matrix[i]![j]!, x))
  for (const [a, b, siemens] of edges) {
    const g = fraction(siemens)
    add(a, a, g)
    if (b < 0) continue
    add(b, b, g)
    add(a, b, minus(fraction(0), g))
    add(b, a, minus(fraction(0), g))
  }
  return solveExactly(matrix, amps.map(fraction)).map(toNumber)
}

function worstError(grid: Grid, amps: readonly number[]): number {
  const [ours, truth] = [here(grid, amps), exactly(grid, amps)]
  return Math.max(...truth.map((value, i) => Math.abs(ours[i]! - value) / Math.abs(value)))
}

/** One ampere into one unknown, so that every answer is a sum of positive terms. */
const into = (size: number, at: number) => Array.from({ length: size }, (_, i) => (i === at ? 1 : 0))

describe('the factor against exact fractions', () => {
  it('keeps every digit with an open of 1e12 ohm beside a contact of a milliohm', () => {
    const grid: Grid = {
      size: 6,
      leak: 1e-11,
      edges: [
        [0, 1, 1000],
        [1, 2, 1e-12],
        [2, 3, 1000],
        [3, 4, 1e7],
        [4, 5, 1 / 4700],
        [0, 2, 1e-12],
        [5, -1, 1e-12],
      ],
    }
    for (let at = 0; at < 6; at++) expect(worstError(grid, into(6, at))).toBeLessThan(2e-15)
  })

  it('keeps them on a floating harness, held by its leaks alone', () => {
    const edges: Grid['edges'] = Array.from({ length: 19 }, (_, i) => [i, i + 1, i % 3 === 0 ? 1e7 : 200])
    const grid: Grid = { size: 20, leak: 1e-11, edges }
    expect(worstError(grid, into(20, 17))).toBeLessThan(5e-15)
    // All 20 unknowns stand where 20 leaks of 1e-11 siemens put one ampere.
    expect(here(grid, into(20, 17))[0]! / (1 / 20e-11)).toBeCloseTo(1, 9)
  })

  it('keeps them on 40 random networks, eighteen decades of conductance mixed', () => {
    let worst = 0
    for (let seed = 1; seed <= 40; seed++) {
      const random = seededRandom(seed)
      const size = random.whole(4, 11)
      const edges: Grid['edges'] = []
      for (let i = 1; i < size; i++) edges.push([i, random.whole(0, i - 1), random.logUniform(1e-12, 1e7)])
      for (let k = random.whole(0, 6); k > 0; k--) {
        const a = random.whole(0, size - 1)
        const b = random.whole(-1, size - 1)
        if (a !== b) edges.push([a, b, random.logUniform(1e-12, 1e7)])
      }
      worst = Math.max(worst, worstError({ size, edges, leak: 1e-11 }, into(size, random.whole(0, size - 1))))
    }
    console.log(`factor against exact fractions: worst relative error ${worst.toExponential(1)}`)
    expect(worst).toBeLessThan(5e-15)
  })

  it('eliminates a tree of a thousand unknowns without filling it in', () => {
    const order = orderElimination(
      1000,
      Array.from({ length: 999 }, (_, i) => [i + 1, Math.floor(i / 3)] as [number, number]),
    )
    expect(order.neighbour.length).toBe(999)
    expect(new Set(order.pivots).size).toBe(1000)
  })
})
