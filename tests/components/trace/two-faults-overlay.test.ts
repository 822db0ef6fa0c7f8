import { describe, expect, it } from 'vitest'
import { traceOverlay } from '@/components/trace/trace-overlay'
import { restCondition } from '@/diagrams/document/condition-schema'
import { drawCircuit } from '@/diagrams/drawing/draw-circuit'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples.find((sample) => sample.title === 'Load space lamp request')!
const unread = evaluate({ circuit, readings: [], codes: [], priors: 'trade' })

/** An answer with two faults, one of them sure, the other with a place that no reading tells from it. */
const answer: Answer = {
  ...unread,
  outcome: 'two-faults',
  sites: unread.sites.map((site) =>
    ['part:f11', 'contact:cab.2', 'wire:w5'].includes(site.site)
      ? { ...site, verdict: 'faulty' as const }
      : site,
  ),
  pairs: [
    {
      sites: ['part:f11', 'contact:cab.2'],
      modes: ['blown', 'open'],
      ohms: [null, null],
      readings: [['R1'], ['R2']],
      probability: 0.9,
    },
  ],
  inseparable: [['contact:cab.2', 'wire:w5']],
}
const readings = [{ id: 'R1', kind: 'works' as const, node: 'lamp', value: false, condition: restCondition }]

describe('two faults on the sheet', () => {
  const overlay = traceOverlay({ circuit, readings, answer, condition: null, next: null })

  it('are lettered A and B, with what no reading tells from them', () => {
    expect([...(overlay.letters ?? [])]).toEqual([
      ['part:f11', 'A'],
      ['contact:cab.2', 'B'],
      ['wire:w5', 'B'],
    ])
  })

  it('have their letter in the diamond, in the place of the cross', () => {
    const svg = drawCircuit(circuit, { verdicts: overlay.verdicts!, letters: overlay.letters! })
    expect(svg.match(/>A<\/text>/g)).toHaveLength(1)
    expect(svg.match(/>B<\/text>/g)).toHaveLength(2)
  })

  it('have no letters while one fault explains all', () => {
    const one = traceOverlay({ circuit, readings, answer: unread, condition: null, next: null })
    expect(one.letters).toBeUndefined()
  })
})
