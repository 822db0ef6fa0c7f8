import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sitesOf, type Mode } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import type { Odds } from '@/diagrams/faults/odds-schema'
import { modesOfClass, partClasses, partClassOf, type PartClass } from '@/diagrams/faults/part-class'
import { classWeight, modeWeight, tradeTable } from '@/diagrams/faults/priors'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { typicalPlaces, updateOdds, type Finding } from '@/diagrams/faults/update-odds'
import { samples } from '@/diagrams/samples/all-samples'

const lampLine = samples.find((sample) => sample.title === 'Load space lamp request')!
const none: Odds = { classes: {}, sites: {} }
const ratio = (odds: Odds, name: PartClass, mode: Mode) =>
  classWeight(name, mode, odds) / classWeight(name, mode)
const first = (odds?: Odds, priors: 'trade' | 'even' = 'trade') =>
  evaluate({ circuit: lampLine, readings: [], codes: [], priors, ...(odds ? { odds } : {}) })

const finding: fc.Arbitrary<Finding> = fc.constantFrom(...partClasses).chain((name) =>
  fc.record(
    {
      class: fc.constant(name),
      mode: fc.constantFrom<Mode>(...modesOfClass[name]),
      count: fc.integer({ min: 1, max: 400 }),
      site: fc.constantFrom(`${name} one`, `${name} two`),
    },
    { requiredKeys: ['class', 'mode', 'count'] },
  ),
)

describe("an organisation's odds", () => {
  it('start from the table of the trade, which knows every class and every way to fail', () => {
    for (const name of partClasses)
      expect(Object.keys(tradeTable[name]).toSorted()).toEqual([...modesOfClass[name]].toSorted())
    expect(updateOdds(none, [])).toEqual(none)
    for (const circuit of samples)
      for (const { id, modes } of sitesOf(circuit))
        for (const mode of modes) {
          expect(modesOfClass[partClassOf(circuit, id)]).toContain(mode)
          expect(modeWeight(circuit, id, mode, 'trade')).toBe(tradeTable[partClassOf(circuit, id)][mode])
        }
  })

  it('move as counted by hand: forty findings, half of them grounds that corrode', () => {
    // Table: places times weight of a class, all together. Grounds: 2.5 places of weight 4.
    const all = partClasses.reduce(
      (sum, name) =>
        sum + typicalPlaces[name] * modesOfClass[name].reduce((s, mode) => s + classWeight(name, mode), 0),
      0,
    )
    const odds = updateOdds(none, [
      { class: 'ground', mode: 'resistive', count: 20 },
      { class: 'contact', mode: 'open', count: 20 },
    ])
    const rate = (4 * (8 + 20)) / (8 + (40 * 2.5 * 4) / all)
    expect(odds.classes.ground!.resistive).toBeCloseTo(rate * ((10 * 0.75 + 20) / 30), 12)
    expect(odds.classes.ground!.open).toBeCloseTo(rate * ((10 * 0.25) / 30), 12)
    expect(ratio(odds, 'ground', 'resistive')).toBeGreaterThan(2)
    // What was foretold and not found falls.
    expect(ratio(odds, 'wire', 'open')).toBeLessThan(0.75)
  })

  it('come to what was found, when much was', () => {
    const odds = updateOdds(none, [
      { class: 'wire', mode: 'short-to-ground', count: 90_000 },
      { class: 'wire', mode: 'open', count: 10_000 },
    ])
    expect(odds.classes.wire!['short-to-ground']! / odds.classes.wire!.open!).toBeCloseTo(9, 2)
  })

  it('are the same in whatever order and portions the findings come, and never zero', () => {
    fc.assert(
      fc.property(fc.array(finding, { maxLength: 12 }), (findings) => {
        const odds = updateOdds(none, findings)
        const again = updateOdds(none, [
          ...findings.toReversed().map((each) => ({ ...each, count: each.count - 1 })),
          ...findings.map((each) => ({ ...each, count: 1 })),
        ])
        for (const table of ['classes', 'sites'] as const) {
          expect(Object.keys(again[table]).toSorted()).toEqual(Object.keys(odds[table]).toSorted())
          for (const [name, weights] of Object.entries(odds[table] as Odds['sites']))
            for (const [mode, weight] of Object.entries(weights)) {
              expect(weight).toBeGreaterThan(0)
              expect((again[table] as Odds['sites'])[name]![mode as Mode]).toBeCloseTo(weight, 9)
            }
        }
      }),
    )
  })

  it('are not overturned by one finding', () => {
    for (const name of partClasses)
      for (const mode of modesOfClass[name]) {
        const odds = updateOdds(none, [{ class: name, mode, count: 1 }])
        for (const other of partClasses)
          for (const way of modesOfClass[other]) {
            expect(ratio(odds, other, way), `${name} ${mode} on ${other} ${way}`).toBeGreaterThan(0.85)
            expect(ratio(odds, other, way), `${name} ${mode} on ${other} ${way}`).toBeLessThan(2.5)
          }
      }
  })

  it('ignore what cannot have been found', () => {
    expect(updateOdds(none, [{ class: 'wire', mode: 'weak', count: 3 }])).toEqual(none)
    expect(updateOdds(none, [{ class: 'wire', mode: 'open', count: 0 }])).toEqual(none)
  })
})

describe('odds in a request', () => {
  const thrice = updateOdds(none, [{ class: 'contact', mode: 'open', count: 3, site: 'contact:c12-4' }])

  it('suspect the contact that failed three times first next time', () => {
    expect(first().sites[0]!.site).not.toBe('contact:c12-4')
    const answer = first(thrice)
    expect(answer.sites[0]!.site).toBe('contact:c12-4')
    expect(answer.sites[0]!.modes[0]!.mode).toBe('open')
    const sum = answer.sites.reduce((total, site) => total + site.probability, answer.noFault)
    expect(sum).toBeCloseTo(1, 9)
  })

  it('change nothing where every place is to be taken alike, and clear nothing', () => {
    expect(first(thrice, 'even')).toEqual(first(undefined, 'even'))
    expect(first(thrice).sites.every((site) => site.verdict === 'in-question')).toBe(true)
  })

  it('give the answer without them where they are those of the trade', () => {
    expect(first({ classes: tradeTable, sites: {} })).toEqual(first())
  })

  const refused: [unknown, string, RegExp][] = [
    [
      { classes: { wire: { weak: 1 } } },
      'odds.classes.wire.weak',
      /class "wire" cannot be weak, expected open/,
    ],
    [{ classes: { wire: { open: 0 } } }, 'odds.classes.wire.open', /^0: expected/],
    [{ classes: { wire: { open: Number.NaN } } }, 'odds.classes.wire.open', /NaN: expected a number/],
    [{ classes: { bulb: { open: 1 } } }, 'odds.classes.bulb', /./],
    [{ sites: { 'wire:w99': { open: 1 } } }, 'odds.sites.wire:w99', /place "wire:w99" does not exist/],
    [{ sites: { 'wire:w5': { dead: 1 } } }, 'odds.sites.wire:w5.dead', /place "wire:w5" cannot be dead/],
  ]
  for (const [odds, path, message] of refused)
    it(`are refused at ${path}`, () => {
      const opened = openEvaluationRequest({ circuit: lampLine, odds })
      if (opened.ok) throw new Error('taken')
      expect(opened.problems[0]!.path).toBe(path)
      expect(opened.problems[0]!.message).toMatch(message)
    })
})

describe('the typical circuit', () => {
  it('has about as many places of each class as the samples', () => {
    const count = (name: PartClass) =>
      samples.flatMap((circuit) => sitesOf(circuit).filter((site) => partClassOf(circuit, site.id) === name))
        .length / samples.length
    for (const name of partClasses)
      expect(Math.abs(typicalPlaces[name] - count(name)), name).toBeLessThan(0.8)
  })
})
