import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { distanceWords } from '@/diagrams/distance/distance-sentence'
import { faultFraction, type WireReadings } from '@/diagrams/distance/fault-fraction'
import { measuredBy, type Measured } from '@/diagrams/distance/measured'
import { possibleFractions } from '@/diagrams/distance/possible-fractions'

const exact = (value: number): Measured => ({ value, low: value, high: value })
const unit = fc.double({ min: 0, max: 1, noNaN: true })
const between = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true })
/** Where within its limits a figure fell: −1 to 1, the limits themselves often. */
const slip = fc.oneof(fc.constantFrom(-1, 0, 1), between(-1, 1))

/** A figure as a meter of this accuracy may show it: off by any part of its limit. */
function shown(true_: number, percent: number, floor: number, off: number): Measured {
  return measuredBy(Math.max(0, true_ + off * ((percent / 100) * true_ + floor)), { percent, floor })
}

/** A wire with a short at a part of its length, and everything a person may have read on it. */
const situation = fc.record({
  place: fc.oneof(fc.constantFrom(0, 0.5, 1), unit),
  drawn: between(0.01, 5),
  wireOff: slip,
  faultOhms: fc.oneof(fc.constant(0), between(0, 50)),
  percent: fc.constantFrom(0, 0.1, 0.5, 2),
  floor: fc.constantFrom(0, 0.001, 0.01, 0.2),
  leads: fc.record({ low: fc.constantFrom(0, 0.1), more: fc.constantFrom(0, 0.4), at: unit }),
  amps: between(0.5, 10),
  slips: fc.array(slip, { minLength: 7, maxLength: 7 }),
  taken: fc.record({
    near: fc.boolean(),
    far: fc.boolean(),
    whole: fc.boolean(),
    nearDrop: fc.boolean(),
    farDrop: fc.boolean(),
  }),
})
type Situation = typeof situation extends fc.Arbitrary<infer T> ? T : never

function readingsOf(given: Situation): WireReadings {
  const { place, drawn, faultOhms, percent, floor, leads, amps, slips, taken } = given
  const whole = drawn * (1 + 0.05 * given.wireOff)
  const lead = leads.low + leads.at * leads.more
  const ohms = (value: number, i: number) => shown(value + lead, percent, floor, slips[i]!)
  const drop = (part: number, i: number) => ({
    volts: shown(amps * part * whole, percent, floor / 10, slips[i]!),
    amps: shown(amps, percent, floor / 10, slips[i + 1]!),
  })
  return {
    drawnOhms: { value: drawn, low: 0.95 * drawn, high: 1.05 * drawn },
    nearOhms: taken.near ? ohms(place * whole + faultOhms, 0) : undefined,
    farOhms: taken.far ? ohms((1 - place) * whole + faultOhms, 1) : undefined,
    wholeOhms: taken.whole ? ohms(whole, 2) : undefined,
    nearDrop: taken.nearDrop ? drop(place, 3) : undefined,
    farDrop: taken.farDrop ? drop(1 - place, 5) : undefined,
    leads: { low: leads.low, high: leads.low + leads.more },
  }
}

describe('where along a wire a short lies', () => {
  it('is found exactly from exact readings, whatever the short itself has', () => {
    fc.assert(
      fc.property(
        unit,
        between(0.01, 5),
        between(0, 1000),
        between(0, 0.5),
        (place, whole, faultOhms, lead) => {
          const leads = { low: lead, high: lead }
          const wide = { value: whole * 1.03, low: whole * 0.95, high: whole * 1.09 }
          const byOhms = faultFraction({
            drawnOhms: wide,
            wholeOhms: exact(whole + lead),
            nearOhms: exact(place * whole + faultOhms + lead),
            farOhms: exact((1 - place) * whole + faultOhms + lead),
            leads,
          })!
          expect(byOhms.value).toBeCloseTo(place, 5)
          expect(byOhms.high - byOhms.low).toBeLessThan(1e-5)
          expect(byOhms.faultOhms).toBeCloseTo(faultOhms, 6)
          // Volts from both ends need no resistance of the wire at all.
          const drop = (part: number, amps: number) => ({
            volts: exact(part * whole * amps),
            amps: exact(amps),
          })
          const byDrops = faultFraction({
            drawnOhms: wide,
            nearDrop: drop(place, 2.1),
            farDrop: drop(1 - place, 1.4),
            leads,
          })!
          expect(byDrops.value).toBeCloseTo(place, 9)
          const byDrop = faultFraction({ drawnOhms: exact(whole), nearDrop: drop(place, 3), leads })!
          expect(byDrop.value).toBeCloseTo(place, 7)
        },
      ),
      { numRuns: 500 },
    )
  })

  it('lies within the limits said, with every reading anywhere within its own', () => {
    fc.assert(
      fc.property(situation, (given) => {
        const readings = readingsOf(given)
        fc.pre(Object.values(given.taken).some(Boolean))
        const found = faultFraction(readings)
        // Readings of a real wire agree with at least the truth.
        expect(found).not.toBeNull()
        expect(found!.low).toBeLessThanOrEqual(given.place + 1e-7)
        expect(found!.high).toBeGreaterThanOrEqual(given.place - 1e-7)
        expect(found!.value).toBeGreaterThanOrEqual(found!.low)
        expect(found!.value).toBeLessThanOrEqual(found!.high)
        for (const figure of [found!.value, found!.low, found!.high, found!.sigma, found!.reach])
          expect(Number.isFinite(figure)).toBe(true)
      }),
      { numRuns: 20_000 },
    )
  })

  it('is said in figures that hold the truth, rounding included, or not said at all', () => {
    let useful = 0
    fc.assert(
      fc.property(situation, between(0.3, 12), (given, length) => {
        fc.pre(Object.values(given.taken).some(Boolean))
        const { useful: worth, says } = distanceWords(faultFraction(readingsOf(given))!, length, 'A', 'B')
        if (!worth) {
          expect(says).not.toMatch(/^The short lies/)
          return
        }
        useful++
        const truth = (end: string) => length * (end === 'A' ? given.place : 1 - given.place)
        const stated = /^The short lies ([\d.]+) m from (A|B), give or take ([\d.]+) (c?m)\.$/.exec(says)
        if (stated) {
          const give = Number(stated[3]) / (stated[4] === 'cm' ? 100 : 1)
          expect(Math.abs(truth(stated[2]!) - Number(stated[1]))).toBeLessThanOrEqual(give + 1e-6)
          return
        }
        const most = /^The short lies at most ([\d.]+) m from (A|B)\. /.exec(says)
        expect(most, says).not.toBeNull()
        expect(truth(most![2]!)).toBeLessThanOrEqual(Number(most![1]) + 1e-6)
      }),
      { numRuns: 20_000 },
    )
    expect(useful).toBeGreaterThan(1000)
  })

  it('has the sigma that readings scattered by half their limits give', () => {
    // 20,000 draws of normal errors, sigma half of the limit; the formula is nearly linear here.
    const [place, whole, fault] = [0.3, 2, 1]
    const figure = (value: number, margin: number) => ({ value, low: value - margin, high: value + margin })
    const [a, b, c] = [place * whole + fault, (1 - place) * whole + fault, whole]
    const found = faultFraction({
      drawnOhms: figure(whole, 0.5),
      nearOhms: figure(a, 0.02),
      farOhms: figure(b, 0.02),
      wholeOhms: figure(c, 0.02),
      leads: { low: 0, high: 0 },
    })!
    let state = 12345
    const next = () => (state = (state * 48271) % 2147483647) / 2147483647
    const normal = () => Math.sqrt(-2 * Math.log(next())) * Math.cos(2 * Math.PI * next())
    const off = Array.from({ length: 20_000 }, () => {
      const [x, y, r] = [a + 0.01 * normal(), b + 0.01 * normal(), c + 0.01 * normal()]
      return (x - y + r) / (2 * r) - place
    })
    const seen = Math.sqrt(off.reduce((all, one) => all + one * one, 0) / off.length)
    expect(found.sigma / seen).toBeGreaterThan(0.97)
    expect(found.sigma / seen).toBeLessThan(1.03)
  })

  it('is refused where the readings contradict one another', () => {
    const drawnOhms = { value: 1, low: 0.95, high: 1.05 }
    const leads = { low: 0, high: 0 }
    // Farther apart than the whole wire has ohms.
    expect(faultFraction({ drawnOhms, nearOhms: exact(5), farOhms: exact(2), leads })).toBeNull()
    // Less in all than the wire has: some other way round.
    expect(faultFraction({ drawnOhms, nearOhms: exact(0.3), farOhms: exact(0.3), leads })).toBeNull()
    // More volts than the whole wire can lose.
    expect(faultFraction({ drawnOhms, nearDrop: { volts: exact(3), amps: exact(2) }, leads })).toBeNull()
  })
})

describe('the possible places', () => {
  it('are those that a fine grid of both pieces finds', () => {
    const limits = fc.record({
      whole: fc.tuple(between(0.2, 1), between(0.01, 1)).map(([low, more]) => ({ low, high: low + more })),
      near: fc.tuple(between(0, 1), between(0.05, 1)).map(([low, more]) => ({ low, high: low + more })),
      difference: fc
        .tuple(between(-1, 1), between(0.05, 1))
        .map(([low, more]) => ({ low, high: low + more })),
    })
    fc.assert(
      fc.property(limits, (given) => {
        const found = possibleFractions(given)
        let [low, high] = [Infinity, -Infinity]
        const within = (value: number, range: { low: number; high: number }) =>
          value >= range.low && value <= range.high
        for (let u = 0; u <= 2; u += 0.01)
          for (let v = 0; v <= 2; v += 0.01)
            if (within(u + v, given.whole) && within(u, given.near) && within(u - v, given.difference)) {
              low = Math.min(low, u / (u + v))
              high = Math.max(high, u / (u + v))
            }
        if (low > high) return
        expect(found!.low).toBeLessThanOrEqual(low + 1e-9)
        expect(found!.high).toBeGreaterThanOrEqual(high - 1e-9)
        // No wider than the grid can miss.
        expect(low - found!.low).toBeLessThan(0.15)
        expect(found!.high - high).toBeLessThan(0.15)
      }),
      { numRuns: 100 },
    )
  })
})
