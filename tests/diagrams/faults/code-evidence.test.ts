import { describe, expect, it } from 'vitest'
import { evaluate } from '@/diagrams/evaluate'
import type { CodeEntry } from '@/diagrams/document/circuit-schema'
import type { Mode } from '@/diagrams/document/sites'
import { codeEvidence } from '@/diagrams/faults/code-evidence'
import { failureTypeView } from '@/diagrams/faults/failure-type-view'
import { FaultModel, faultModelOf } from '@/diagrams/faults/fault-model'
import { samples } from '@/diagrams/samples/all-samples'
import { failureTypes } from '@/diagrams/tables/failure-types'

const sample = (title: string) => samples.find((each) => each.title === title)!
const lampLine = sample('Load space lamp request')
const first = (codes: string[]) => evaluate({ circuit: lampLine, readings: [], codes, priors: 'trade' })
const probability = (codes: string[], ...sites: string[]) =>
  first(codes)
    .sites.filter((site) => sites.includes(site.site))
    .reduce((sum, site) => sum + site.probability, 0)

/** The same line with another list of codes. */
const withCodes = (...codes: Partial<CodeEntry>[]) =>
  new FaultModel({
    ...lampLine,
    codes: codes.map((code) => ({
      code: 'B1A31',
      text: '',
      setWhen: '',
      firstChecks: '',
      sites: ['wire:w6'],
      ...code,
    })),
  })

/** Probability that the code is set by the harshest fault of a site and mode: the one that surely shows. */
function sets(model: FaultModel, code: string, site: string, mode: Mode): number {
  const evidence = codeEvidence(model, [code])!
  const logs = model.hypotheses.flatMap((hypothesis, h) =>
    hypothesis.site === site && hypothesis.mode === mode ? [...evidence.cells[h]!] : [],
  )
  return Math.exp(Math.max(...logs))
}

describe('a trouble code as evidence', () => {
  it('makes faults that the module would see as the code says more probable, and no fault less', () => {
    expect(first(['B1A31-14']).noFault).toBeLessThan(first([]).noFault / 5)
    expect(probability(['B1A31-14'], 'wire:w6')).toBeGreaterThan(1.2 * probability([], 'wire:w6'))
    // A bad feed of the other module changes nothing that its input sees.
    expect(probability(['B1A31-14'], 'contact:c12-4')).toBeLessThan(probability([], 'contact:c12-4') / 5)
  })

  it('follows the failure type: held low is not held high', () => {
    const modeOf = (codes: string[], mode: string) =>
      first(codes)
        .sites.flatMap((site) => site.modes)
        .filter((m) => m.mode === mode)
        .reduce((sum, m) => sum + m.probability, 0)
    expect(modeOf(['B1A31-12'], 'short-to-supply')).toBeGreaterThan(
      5 * modeOf(['B1A31-14'], 'short-to-supply'),
    )
  })

  it('clears nothing by itself, and an unknown code changes nothing', () => {
    expect(first(['B1A31-14']).sites.every((site) => site.verdict === 'in-question')).toBe(true)
    expect(first(['P0001', 'no code']).sites).toEqual(first([]).sites)
    expect(codeEvidence(faultModelOf(lampLine), ['P0001'])).toBeNull()
  })

  it('counts once, however often it is listed', () => {
    const model = faultModelOf(lampLine)
    expect(codeEvidence(model, ['B1A31-14', 'B1A31-14'])).toEqual(codeEvidence(model, ['B1A31-14']))
  })
})

describe('failure types at an input that the module pulls down', () => {
  // An open lets pin 5 fall, a short to ground holds it there: one level. A short to supply holds it up with the key off.
  const answers: [string, number, number, number][] = [
    // type, open, short to ground, short to supply: probability that the code is set. 0.98 as named, 0.3 the level of what
    // is named, 0.1 on the list but never seen so, 0.02 pointing wrong.
    ['14', 0.98, 0.98, 0.02],
    ['15', 0.98, 0.3, 0.98],
    ['11', 0.3, 0.98, 0.02],
    ['12', 0.1, 0.02, 0.98],
    ['13', 0.98, 0.3, 0.02],
    ['16', 0.98, 0.98, 0.02],
    ['17', 0.1, 0.02, 0.98],
    ['1C', 0.98, 0.98, 0.98],
    ['23', 0.98, 0.98, 0.02],
    ['24', 0.1, 0.02, 0.98],
    ['29', 0.98, 0.98, 0.98],
    ['64', 0.98, 0.98, 0.98],
    ['00', 0.98, 0.98, 0.98],
  ]
  for (const [type, open, ground, supply] of answers)
    it(`weighs ${type} by the level it names`, () => {
      const model = withCodes({ failureType: type, sites: ['wire:w6', 'contact:body.5'] })
      const code = `B1A31-${type}`
      expect(sets(model, code, 'contact:body.5', 'open')).toBeCloseTo(open, 9)
      expect(sets(model, code, 'wire:w6', 'short-to-ground'), 'short to ground').toBeCloseTo(ground, 9)
      expect(sets(model, code, 'wire:w6', 'short-to-supply'), 'short to supply').toBeCloseTo(supply, 9)
    })
})

describe('a code of another kind', () => {
  it('of a driver is set by what parts its load from its feed, seen as no current or no volts at the pin', () => {
    const model = faultModelOf(sample('Two-speed cooling fan'))
    for (const site of ['wire:w7', 'part:k1.coil'])
      expect(sets(model, 'P1A48-13', site, 'open'), site).toBeCloseTo(0.98, 9)
    // The other relay's control wire is watched by another pin.
    expect(sets(model, 'P1A48-13', 'wire:w9', 'open')).toBeLessThan(0.3)
  })

  it('keeps both faults of 14 where the module pulls the line up, too', () => {
    const tailgate = sample('Tailgate release button')
    const model = new FaultModel({
      ...tailgate,
      codes: [{ ...tailgate.codes[0]!, failureType: '14', sites: ['wire:w3', 'wire:w4'] }],
    })
    expect(sets(model, 'B1B07-14', 'wire:w3', 'short-to-ground')).toBeCloseTo(0.98, 9)
    expect(sets(model, 'B1B07-14', 'wire:w3', 'open')).toBeCloseTo(0.98, 9)
  })

  it('of a module that sleeps is never set by its pin, but a network code is set by its sleep', () => {
    const feed = { site: 'contact:c12-4', mode: 'open' } as const
    const pin = withCodes({ failureType: '14', sites: ['wire:w6'] })
    expect(sets(pin, 'B1A31-14', feed.site, feed.mode)).toBeCloseTo(0.02, 9)
    const bus = withCodes({ code: 'U0140', failureType: '87', sites: ['wire:w8'] })
    expect(sets(bus, 'U0140-87', feed.site, feed.mode)).toBeCloseTo(0.98, 9)
    expect(sets(bus, 'U0140-87', 'wire:w5', 'open')).toBeCloseTo(0.1, 9)
  })

  it('about the inside of a module points at its pins and itself, about a part at the listed places, about programming at nothing', () => {
    const inside = withCodes({ failureType: '49', sites: ['pin:cab.7'] })
    expect(sets(inside, 'B1A31-49', 'module:cab', 'dead')).toBeCloseTo(0.98, 9)
    expect(sets(inside, 'B1A31-49', 'wire:w5', 'open')).toBeCloseTo(0.1, 9)
    const part = withCodes({ failureType: '96', sites: ['wire:w6'] })
    expect(sets(part, 'B1A31-96', 'wire:w6', 'open')).toBeCloseTo(0.98, 9)
    expect(codeEvidence(withCodes({ failureType: '51' }), ['B1A31-51'])).toBeNull()
    expect(codeEvidence(withCodes({ failureType: 'F4' }), ['B1A31-F4'])).toBeNull()
  })

  it('with no place listed asks any pin, and says less', () => {
    const model = withCodes({ failureType: '12', sites: [] })
    expect(sets(model, 'B1A31-12', 'wire:w5', 'short-to-supply')).toBeCloseTo(0.98, 9)
    expect(sets(model, 'B1A31-12', 'wire:w8', 'open')).toBeCloseTo(0.1, 9)
  })

  it('of a type the document does not have is judged by its own type at the places of that code', () => {
    const model = faultModelOf(lampLine)
    expect(sets(model, 'B1A31-11', 'wire:w6', 'short-to-ground')).toBeCloseTo(0.98, 9)
    expect(sets(model, 'B1A31-11', 'wire:w6', 'open')).toBeCloseTo(0.3, 9)
  })

  it('without its type stands for any one of its entries', () => {
    const model = faultModelOf(lampLine)
    for (const mode of ['open', 'short-to-ground', 'short-to-supply'] as const)
      expect(sets(model, 'B1A31', 'wire:w6', mode), mode).toBeCloseTo(0.98, 9)
  })

  it('of a bus where no pin shows it follows the list', () => {
    const model = faultModelOf(sample('Bus pair and diagnostic connector'))
    const evidence = codeEvidence(model, ['U1A10-87'])!
    expect(evidence.good).toBeCloseTo(Math.log(0.02), 9)
    expect(sets(model, 'U1A10-87', 'wire:w3', 'open')).toBeCloseTo(0.98, 9)
  })
})

describe('every failure type', () => {
  it('speaks of something, and only programming speaks of nothing', () => {
    for (const { hex } of failureTypes) expect(failureTypeView(hex).of === 'nothing', hex).toBe(hex === '05')
    expect(failureTypeView(null).of).toBe('pin')
  })

  it('leaves every place of every sample possible with every code of it', () => {
    for (const circuit of samples)
      for (const { code, failureType } of circuit.codes) {
        const evidence = codeEvidence(faultModelOf(circuit), [failureType ? `${code}-${failureType}` : code])!
        for (const cells of [Float64Array.of(evidence.good), ...evidence.cells])
          for (const log of cells) expect(log).toBeGreaterThanOrEqual(Math.log(0.02) - 1e-9)
      }
  }, 60_000)
})
