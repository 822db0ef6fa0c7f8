import { describe, expect, it } from 'vitest'
import { add, big, divide, multiply, solveBig, subtract, toDouble } from './big-float'

describe('fractions of 320 bits', () => {
  it('give back every double, and reckon as the rationals do', () => {
    for (const value of [0, 1, -1, 0.1, 1e-11, 1.5e300, -7.25e-300]) expect(toDouble(big(value))).toBe(value)
    const third = divide(big(1), big(3))
    expect(toDouble(subtract(multiply(third, big(3)), big(1)))).toBeCloseTo(0, 90)
    // What a double loses at once: 1 + 1e-40 − 1.
    const small = divide(big(1), big(1e40))
    expect(toDouble(subtract(add(big(1), small), big(1))) * 1e40).toBeCloseTo(1, 12)
  })
  it('solve a divider and a bridge', () => {
    const divider = solveBig(3, [
      { a: 1, b: 0, ohms: 1e-3, volts: 12 },
      { a: 1, b: 2, ohms: 3, volts: 0 },
      { a: 2, b: 0, ohms: 1, volts: 0 },
    ])
    expect(toDouble(divider[2]!)).toBeCloseTo(12 / 4.001, 12)
    // One ampere through 1 and 2 ohm in parallel.
    const driven = solveBig(
      2,
      [
        { a: 1, b: 0, ohms: 1, volts: 5 },
        { a: 1, b: 0, ohms: 2, volts: 0 },
      ],
      [1, 0],
    )
    expect(toDouble(driven[1]!)).toBeCloseTo(2 / 3, 14)
  })
})
