import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { binsOf, bitsOf } from '@/diagrams/planner/split'

const weigh = (row: number[], units: number[], weights?: number[]) =>
  bitsOf(
    binsOf('volts', Float64Array.from(row)),
    Float64Array.from(weights ?? row.map(() => 1 / row.length)),
    Int32Array.from(units),
    Math.max(...units) + 1,
  )

describe('what a reading is worth', () => {
  it('is one bit when it halves four equal suspects (Shannon, A mathematical theory of communication, 1948)', () => {
    expect(weigh([0, 0, 12.6, 12.6], [0, 1, 2, 3])).toBeCloseTo(1, 12)
  })

  it('is two bits when four equal suspects all show differently', () => {
    expect(weigh([0, 4, 8, 12], [0, 1, 2, 3])).toBeCloseTo(2, 12)
  })

  it('is nothing when the split runs inside one suspect', () => {
    expect(weigh([0, 12.6], [0, 0])).toBeCloseTo(0, 12)
  })

  it('is nothing when the meter cannot tell the figures apart', () => {
    expect(weigh([12.5, 12.51, 12.52], [0, 1, 2])).toBe(0)
  })

  it('weighs suspects by their odds: 1 in 4 set apart is 0.811 bit', () => {
    // −¼ log2 ¼ − ¾ log2 ¾ = 0.8113
    expect(weigh([0, 12.6], [0, 1], [0.25, 0.75])).toBeCloseTo(0.8113, 4)
  })

  it('is never negative and never more than the doubt there is', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.record({
            volts: fc.double({ min: -15, max: 15, noNaN: true }),
            unit: fc.nat(5),
            weight: fc.double({ min: 1e-6, max: 1, noNaN: true }),
          }),
          { minLength: 1, maxLength: 40 },
        ),
        (particles) => {
          const total = particles.reduce((sum, particle) => sum + particle.weight, 0)
          const bits = weigh(
            particles.map((p) => p.volts),
            particles.map((p) => p.unit),
            particles.map((p) => p.weight / total),
          )
          const masses = [0, 1, 2, 3, 4, 5].map((unit) =>
            particles.filter((p) => p.unit === unit).reduce((sum, p) => sum + p.weight / total, 0),
          )
          const doubt = masses.reduce((sum, mass) => sum - (mass > 0 ? mass * Math.log2(mass) : 0), 0)
          expect(bits).toBeGreaterThanOrEqual(0)
          expect(bits).toBeLessThanOrEqual(doubt + 1e-9)
        },
      ),
    )
  })

  it('sets OL apart from every figure and leaves out what foretells nothing', () => {
    const bins = binsOf('ohms', Float64Array.from([0.1, Number.POSITIVE_INFINITY, 5e7, Number.NaN, 0.2]))
    expect(bins.map((bin) => bin.members)).toEqual([
      [0, 4],
      [1, 2],
    ])
  })
})
