import { describe, expect, it } from 'vitest'
import { traceOverlay } from '@/components/trace/trace-overlay'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples[0] as (typeof samples)[number]
const [wire] = circuit.wires
const volts = (id: string, red: string, value: number): Reading => ({
  id,
  kind: 'volts',
  red,
  black: 'chassis',
  value,
  condition: restCondition,
})
const unread = evaluate({ circuit, readings: [], codes: [], priors: 'trade' })
const of = (readings: Reading[], answer: Answer | null, next = unread.next[0] ?? null) =>
  traceOverlay({ circuit, readings, answer, condition: restCondition, next })

describe('what a trace lays over its sheet', () => {
  it('is no verdict at all before the first reading, only the next target', () => {
    const overlay = of([], unread)
    expect(overlay.verdicts?.size).toBe(0)
    expect(overlay.flags?.every((flag) => flag.style === 'next')).toBe(true)
    expect(overlay.flags?.length).toBeGreaterThan(0)
  })

  it('is a verdict for every place once there is a reading, and a flag with number and value', () => {
    const readings = [volts('R1', wire?.to ?? '', 12.58)]
    const overlay = of(readings, evaluate({ circuit, readings, codes: [], priors: 'trade' }), null)
    expect(overlay.verdicts?.size).toBe(unread.sites.length)
    expect(overlay.flags).toEqual([{ at: wire?.to, number: 'R1', value: '12.58 V', style: 'taken' }])
  })

  it('keeps one flag a point: the newest reading there', () => {
    const readings = [volts('R1', wire?.to ?? '', 12.58), volts('R2', wire?.to ?? '', 12.5)]
    expect(of(readings, unread, null).flags?.map((flag) => flag.number)).toEqual(['R2'])
  })

  it('gives a dashed border to the reading that fits no fault, and withdraws what was proved good', () => {
    const readings = [volts('R1', wire?.to ?? '', 40)]
    const answer = evaluate({ circuit, readings, codes: [], priors: 'trade' })
    expect(answer.outcome).toBe('cannot-be')
    const overlay = of(readings, answer, null)
    expect(overlay.flags?.[0]?.style).toBe('odd')
    expect([...(overlay.verdicts?.values() ?? [])]).not.toContain('proved-good')
  })

  it('shows the fuse that the fault has blown', () => {
    const [first] = unread.sites
    const fuse = circuit.nodes.find((node) => node.kind === 'fuse')?.id ?? ''
    const mode = {
      mode: 'short-to-ground' as const,
      probability: 0.97,
      ohms: 0.1,
      other: null,
      blows: [fuse],
    }
    const located: Answer = {
      ...unread,
      outcome: 'located',
      sites: first ? [{ ...first, verdict: 'faulty', modes: [mode] }] : [],
    }
    expect(of([volts('R1', wire?.to ?? '', 0)], located, null).moment?.blown).toEqual([fuse])
    expect(of([], unread).moment?.blown).toEqual([])
  })

  it('draws a short as a tail from the wire to what it touches', () => {
    const shorted = (mode: 'short-to-ground' | 'short-to-wire', other: string | null): Answer => ({
      ...unread,
      outcome: 'located',
      sites: [
        {
          site: `wire:${wire?.id}`,
          verdict: 'faulty',
          firm: false,
          clearedBy: [],
          says: '',
          probability: 0.98,
          modes: [
            { mode: 'open', probability: 0.01, ohms: null, other: null, blows: [] },
            { mode, probability: 0.97, ohms: 0.2, other, blows: [] },
          ],
        },
      ],
    })
    const readings = [volts('R1', wire?.to ?? '', 0)]
    const second = circuit.wires[1]?.id ?? ''
    expect(of(readings, shorted('short-to-ground', null), null).tails).toMatchObject([
      { wire: wire?.id, to: 'ground' },
    ])
    expect(of(readings, shorted('short-to-wire', second), null).tails).toMatchObject([
      { wire: wire?.id, to: { wire: second } },
    ])
  })
})
