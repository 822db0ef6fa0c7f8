import { describe, expect, it } from 'vitest'
import type { NodeInput } from '@/tests/support/harness-draft'
import { keyOn } from '@/tests/support/lamp-line'
import { madeCircuit, onOff, operate, whenOn } from '@/tests/support/made-circuit'
import { faultyOf, shareOf, siteOf, ToldStory } from '@/tests/support/told-story'

/** Consequences of a fault that lie away from it (common practice, no source). */

/** A fused feed for a module that drives a lamp, holds up an input and feeds a 5 V line; a fan by relay from the same fuse. */
const fused = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'f2', kind: 'fuse', amps: 15, label: 'F2' },
    { id: 's', kind: 'splice', label: 'S1' },
    {
      id: 'm',
      kind: 'module',
      label: 'M1',
      pins: [
        { pin: '1', circuit: { type: 'supply', ohms: 200 } },
        { pin: '2', circuit: { type: 'ground' } },
        { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
        { pin: '4', circuit: { type: 'pull-up', volts: 12, ohms: 1000 } },
        { pin: '5', circuit: { type: 'source', volts: 5, ohms: 5 } },
      ],
    },
    { id: 'k', kind: 'relay', label: 'K1' },
    { id: 'fan', kind: 'load', ohms: 1.5, style: 'motor', label: 'Fan' },
    { id: 'sensor', kind: 'resistor', ohms: 1000 },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('door') }] },
    { id: 'lamp', kind: 'load', ohms: 12, label: 'Lamp' },
    { id: 'g', kind: 'ground', label: 'G1' },
  ] satisfies NodeInput[],
  [
    'bat.pos > f2.in', // w1
    'f2.out > s.s', // w2
    's.s > m.1', // w3
    'm.2 > g.in', // w4
    's.s > k.86', // w5
    'k.85 > m.3', // w6
    's.s > k.30', // w7
    'k.87 > fan.a', // w8
    'fan.b > g.in', // w9
    'm.4 > sw.in', // w10
    'sw.out > g.in', // w11
    'm.5 > sensor.a', // w12
    'sensor.b > g.in', // w13
    'bat.pos > lamp.a', // w14
    'lamp.b > g.in', // w15
  ],
  { controls: [onOff('key'), onOff('door')] },
)

describe('a fault shows away from where it is', () => {
  it('a short behind a relay has blown the fuse that its module is fed from too, and the module sleeps', () => {
    const fault = { site: 'wire:w8', mode: 'short-to-ground', ohms: 0.05 } as const
    const point = operate(fused, {}, fault)
    expect(point.blown).toEqual(['f2'])
    expect(point.modules.get('m')).toBe(false)
    const story = new ToldStory(fused, fault)
    expect(story.volts('m.5')).toBeLessThan(0.01)
    expect(story.sees('m.4')).toBe('low')
    expect(story.volts('f2.in')).toBeGreaterThan(12.5)
    expect(story.volts('f2.out')).toBeLessThan(0.01)
    expect(story.ohms('k.87', 'chassis')).toBeLessThan(0.1)
    const answer = story.answer()
    expect(answer.sites[0]!.site).toBe('wire:w8')
    expect(answer.sites[0]!.modes[0]).toMatchObject({ mode: 'short-to-ground', blows: ['f2'] })
    expect(siteOf(answer, 'part:f2').probability).toBeLessThan(0.05)
  })

  it('a module without its supply takes its pull-up, its 5 V line and its drivers with it', () => {
    const story = new ToldStory(fused, { site: 'wire:w3', mode: 'open' })
    expect(story.works('fan', keyOn)).toBe(false)
    expect(story.volts('m.4')).toBeLessThan(0.01)
    expect(story.volts('m.5')).toBeLessThan(0.01)
    const asleep = story.answer()
    // Three things of one module at once: what keeps it awake, not three faults.
    const awake = ['wire:w3', 'pin:m.1', 'module:m', 'wire:w4', 'pin:m.2', 'part:f2', 'wire:w1', 'wire:w2']
    expect(
      shareOf(asleep, [...awake, 'part:s', 'part:g', 'part:bat', 'wire:w7', 'wire:w8', 'wire:w5']),
    ).toBeGreaterThan(0.95)
    expect(shareOf(asleep, ['pin:m.3', 'pin:m.4', 'pin:m.5'])).toBeLessThan(0.02)
    expect(story.volts('s.s')).toBeGreaterThan(12.5)
    expect(story.volts('m.1')).toBeLessThan(0.01)
    // The crimp of the splice at that wire is the same to any meter.
    expect(faultyOf(story.answer())).toEqual(['wire:w3', 'part:s'])
  })

  it('a relay drops out when a bad joint before it gives way under the load it has switched', () => {
    // A joint that carries the coil alone passes; with 12 A through it the coil is starved, so the circuit chatters.
    const joint = (ohms: number) => ({ site: 'wire:w6', mode: 'resistive', ohms }) as const
    expect(operate(fused, keyOn, joint(40)).relays.get('k')).toBe(true)
    expect(operate(fused, keyOn, joint(80)).relays.get('k')).toBe(false)
    const story = new ToldStory(fused, joint(80))
    expect(story.works('fan', keyOn)).toBe(false)
    expect(story.volts('k.86', keyOn, 'k.85')).toBeLessThan(7.5)
    expect(story.volts('k.85', keyOn)).toBeGreaterThan(5)
    expect(story.volts('m.3', keyOn)).toBeLessThan(0.2)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['wire:w6'])
    expect(siteOf(answer, 'wire:w6').modes[0]!.mode).toBe('resistive')
  })

  it('a lost ground of a module and a lamp lifts the module, and its low drivers pull to the lamp', () => {
    const story = new ToldStory(fused, { site: 'part:g', mode: 'open' })
    expect(story.volts('g.in')).toBeGreaterThan(11)
    expect(story.works('lamp')).toBe(false)
    expect(story.volts('m.5')).toBeGreaterThan(11)
    const answer = story.answer()
    expect(answer.sites[0]!.site).toBe('part:g')
    expect(answer.outcome).not.toBe('cannot-be')
  })
})
