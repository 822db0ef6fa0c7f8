import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sitesOf } from '@/diagrams/document/sites'
import { pathOrder } from '@/diagrams/drawing/path-order'
import { samples } from '@/diagrams/samples/all-samples'
import { anyCircuit } from './random-circuit'

const named = (title: string) => {
  const found = samples.find((circuit) => circuit.title === title)
  if (!found) throw new Error(`no sample "${title}"`)
  return found
}

describe('path order', () => {
  it('has every place of every sample exactly once', () => {
    for (const circuit of samples) {
      const walked = pathOrder(circuit, new Map()).flatMap((leg) => leg.sites)
      expect(walked.toSorted(), circuit.title).toEqual(
        sitesOf(circuit)
          .map((site) => site.id)
          .toSorted(),
      )
    }
  })

  it('has every place exactly once, whatever is drawn and whatever the odds', () => {
    fc.assert(
      fc.property(anyCircuit, fc.array(fc.double({ min: 0, max: 1, noNaN: true })), (circuit, odds) => {
        const sites = sitesOf(circuit).map((site) => site.id)
        const probability = new Map(sites.map((site, at) => [site, odds[at % Math.max(1, odds.length)] ?? 0]))
        const legs = pathOrder(circuit, probability)
        expect(legs.flatMap((leg) => leg.sites).toSorted()).toEqual(sites.toSorted())
        expect(legs.every((leg) => leg.name !== '' && leg.sites.length > 0)).toBe(true)
      }),
      { numRuns: 200, seed: 20 },
    )
  })

  it('walks a one-way circuit from its feed to its ground without a break', () => {
    const legs = pathOrder(named('Tailgate release button'), new Map())
    expect(legs.map((leg) => leg.name)).toEqual(['Body module pin 1', 'G4', 'G3'])
    expect(legs[1]?.sites).toEqual([
      'contact:bcm.18',
      'pin:bcm.18',
      'wire:w3',
      'contact:c31-5',
      'wire:w4',
      'contact:sw2.a',
      'part:sw2.c1',
      'contact:sw2.b',
      'wire:w5',
      'contact:c31-6',
      'wire:w6',
      'part:g4',
    ])
  })

  it('takes the leg with the most probability first at a branch, else the one drawn first', () => {
    const mirrors = named('Heated mirrors')
    const legNames = (probability: [string, number][]) =>
      pathOrder(mirrors, new Map(probability))
        .map((leg) => leg.name)
        .filter((name) => name.includes('heater'))
    expect(legNames([])).toEqual(['E7 left mirror heater', 'E8 right mirror heater'])
    expect(legNames([['wire:w15', 0.6]])).toEqual(['E8 right mirror heater', 'E7 left mirror heater'])
  })

  it('does not walk back through a lamp into the feed of another', () => {
    const legs = pathOrder(named('Trailer stop and tail lamps'), new Map())
    const tail = legs.find((leg) => leg.name === 'E3 left tail')
    expect(tail?.sites.slice(0, 4)).toEqual(['wire:w10', 'contact:e3.a', 'part:e3', 'contact:e3.b'])
  })
})
