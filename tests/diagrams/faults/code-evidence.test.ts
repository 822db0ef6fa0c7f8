import { describe, expect, it } from 'vitest'
import { evaluate } from '@/diagrams/evaluate'
import { samples } from '@/diagrams/samples/all-samples'

const lampLine = samples.find((sample) => sample.title === 'Load space lamp request')!
const first = (codes: string[]) => evaluate({ circuit: lampLine, readings: [], codes, priors: 'trade' })
const probability = (codes: string[], ...sites: string[]) =>
  first(codes)
    .sites.filter((site) => sites.includes(site.site))
    .reduce((sum, site) => sum + site.probability, 0)

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
    expect(first(['P0001']).sites).toEqual(first([]).sites)
  })
})
