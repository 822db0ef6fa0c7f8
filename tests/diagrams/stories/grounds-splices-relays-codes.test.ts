import { describe, expect } from 'vitest'
import type { NodeInput } from '@/tests/support/harness-draft'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { madeCircuit, onOff, operate, whenOn } from '@/tests/support/made-circuit'
import { faultyOf, leftOf, shareOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

const battery: NodeInput = { id: 'bat', kind: 'battery' }
const load = (id: string, ohms: number): NodeInput => ({ id, kind: 'load', ohms })

describe('grounds', () => {
  fact('ground-stack', () => {
    const stacked = madeCircuit(
      [
        battery,
        load('horn', 4),
        load('heater', 3),
        load('lamp', 6),
        { id: 's', kind: 'splice' },
        { id: 'g', kind: 'ground' },
        { id: 'g2', kind: 'ground' },
      ],
      [
        'bat.pos > horn.a',
        'bat.pos > heater.a',
        'bat.pos > lamp.a',
        'horn.b > s.s',
        'heater.b > s.s',
        's.s > g.in', // w6
        'lamp.b > g2.in',
      ],
    )
    const story = new ToldStory(stacked, { site: 'part:g', mode: 'resistive', ohms: 2 })
    expect(story.works('horn')).toBe(false)
    expect(story.works('heater')).toBe(false)
    expect(story.works('lamp')).toBe(true)
    const answer = story.answer()
    // Two unrelated loads down together: what they share does it, or hardly anything.
    expect(shareOf(answer, ['part:g', 'part:s', 'wire:w6'])).toBeGreaterThan(0.9)
    expect(answer.sites[0]!.site).toBe('part:g')
  })

  fact('ground-paint', () => {
    const story = new ToldStory(lampLine(1.2), { site: 'part:g1', mode: 'resistive', ohms: 0.6 })
    expect(story.ohms('g1.in', 'chassis')).toBeLessThan(1)
    expect(story.volts('g1.in', keyOn)).toBeGreaterThan(3.5)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['part:g1'])
    expect(siteOf(answer, 'part:g1').modes[0]).toMatchObject({ mode: 'resistive' })
    expect(siteOf(answer, 'part:g1').modes[0]!.ohms!).toBeLessThan(1)
  })
})

describe('splices', () => {
  const spliced = madeCircuit(
    [battery, { id: 's', kind: 'splice' }, load('left', 6), load('right', 6), { id: 'g', kind: 'ground' }],
    ['bat.pos > s.s', 's.s > left.a', 's.s > right.a', 'left.b > g.in', 'right.b > g.in'],
  )
  fact('splice', () => {
    const good = operate(spliced)
    expect(good.volts.get('left.a')).toBeCloseTo(good.volts.get('right.a')!, 6)
    const story = new ToldStory(spliced, { site: 'part:s', mode: 'resistive', ohms: 2, wire: 'w2' })
    expect(story.volts('s.s')).toBeGreaterThan(12.4)
    expect(story.volts('right.a')).toBeGreaterThan(12.4)
    expect(story.volts('left.a')).toBeLessThan(10)
    const answer = story.answer()
    // The bad joint is in the branch or in its crimp, and both are the same to a meter.
    expect(leftOf(answer).toSorted()).toEqual(['part:s', 'wire:w2'])
  })

  fact('splice-branch', () => {
    const branch = new ToldStory(spliced, { site: 'part:s', mode: 'open', wire: 'w3' })
    expect(branch.works('left')).toBe(true)
    expect(branch.works('right')).toBe(false)
    const one = branch.answer()
    expect(shareOf(one, ['part:s', 'wire:w3', 'part:right', 'wire:w5'])).toBeGreaterThan(0.95)
    for (const open of ['wire:w1', 'wire:w2', 'wire:w4'])
      expect(siteOf(one, open).modes.find((mode) => mode.mode === 'open')!.probability).toBeLessThan(1e-3)

    const before = new ToldStory(spliced, { site: 'wire:w1', mode: 'open' })
    expect(before.works('left')).toBe(false)
    expect(before.works('right')).toBe(false)
    const both = before.answer()
    expect(shareOf(both, ['wire:w1', 'part:s', 'part:g', 'part:bat'])).toBeGreaterThan(0.9)
    for (const open of ['wire:w2', 'wire:w3', 'part:left', 'part:right'])
      expect(siteOf(both, open).modes.find((mode) => mode.mode === 'open')!.probability).toBeLessThan(0.01)
  })
})

/** A relay with its own plug, its coil switched by a key, its contact feeding a motor. */
const relayLine = madeCircuit(
  [
    battery,
    {
      id: 'key',
      kind: 'switch',
      contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }],
    },
    { id: 'k3', kind: 'relay', label: 'K3' },
    { id: 'motor', kind: 'load', ohms: 2, style: 'motor' },
    { id: 'g', kind: 'ground' },
    { id: 'g2', kind: 'ground' },
  ],
  [
    'bat.pos > key.in', // w1
    'key.out > k3.86', // w2
    'k3.85 > g.in', // w3
    'bat.pos > k3.30', // w4
    'k3.87 > motor.a', // w5
    'motor.b > g2.in', // w6
  ],
  { controls: [onOff('key')] },
)

describe('relays', () => {
  fact('relay-click', () => {
    const fault = { site: 'part:k3.contact', mode: 'stuck-open' } as const
    // The coil pulls in, which is what one hears; the motor stands.
    expect(operate(relayLine, keyOn, fault).relays.get('k3')).toBe(true)
    const story = new ToldStory(relayLine, fault)
    expect(story.works('motor', keyOn)).toBe(false)
    expect(story.volts('k3.86', keyOn, 'k3.85')).toBeGreaterThan(12.4)
    expect(story.amps('w3', keyOn)).toBeCloseTo(12.6 / 85, 1)
    const coilProved = story.answer()
    expect(siteOf(coilProved, 'part:k3.contact').verdict).toBe('in-question')
    for (const good of ['wire:w2', 'part:key.x', 'part:g'])
      expect(siteOf(coilProved, good).verdict).toBe('proved-good')
    expect(story.volts('k3.30', keyOn)).toBeGreaterThan(12.4)
    expect(story.volts('k3.87', keyOn)).toBeLessThan(0.01)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['part:k3.contact'])
    expect(siteOf(answer, 'part:k3.coil').verdict).toBe('proved-good')
  })

  fact('relay-bridge', () => {
    const story = new ToldStory(relayLine, { site: 'part:k3.coil', mode: 'open' })
    expect(story.works('motor', keyOn)).toBe(false)
    const bridged = { unplugged: ['k3'], added: [{ from: 'k3.30', to: 'k3.87', ohms: 0.05 }] }
    expect(story.works('motor', bridged)).toBe(true)
    // That it runs leaves the bridged way a slight loss at most; its volts under load clear it.
    const proved = ['wire:w4', 'wire:w5', 'part:motor', 'wire:w6', 'part:g2']
    expect(shareOf(story.answer(), proved)).toBeLessThan(0.02)
    expect(story.volts('motor.a', bridged, 'motor.b')).toBeGreaterThan(11.5)
    const answer = story.answer()
    // All but the motor's own winding, which may have gained half an ohm and still run.
    for (const good of proved.filter((site) => site !== 'part:motor'))
      expect(siteOf(answer, good).verdict, good).toBe('proved-good')
    expect(siteOf(answer, 'part:motor').modes.find((mode) => mode.mode === 'open')!.probability).toBeLessThan(
      1e-3,
    )
    const left = ['part:k3.coil', 'part:k3.contact', 'wire:w1', 'wire:w2', 'wire:w3', 'part:key.x', 'part:g']
    for (const site of left) expect(siteOf(answer, site).verdict, site).toBe('in-question')
    expect(shareOf(answer, left)).toBeGreaterThan(0.99)
  })
})

describe('a bus at rest', () => {
  const end = (id: string): NodeInput => ({
    id,
    kind: 'module',
    pins: [
      { pin: '1', circuit: { type: 'bridge', to: '2', ohms: 120 } },
      { pin: '2', circuit: { type: 'none' } },
    ],
  })
  const bus = madeCircuit(
    [battery, end('near'), { id: 'h', kind: 'splice' }, { id: 'l', kind: 'splice' }, end('far')],
    ['near.1 > h.s', 'near.2 > l.s', 'h.s > far.1', 'l.s > far.2'],
  )
  fact('can-60', () => {
    const good = new ToldStory(bus)
    expect(good.ohms('h.s', 'l.s')).toBeCloseTo(60, 0)
    expect(good.answer().readings[0]!.agrees).toBe(true)
    const story = new ToldStory(bus, { site: 'wire:w3', mode: 'open' })
    expect(story.ohms('h.s', 'l.s')).toBeCloseTo(120, 0)
    expect(story.ohms('near.1', 'near.2')).toBeCloseTo(120, 0)
    expect(story.ohms('far.1', 'far.2')).toBeCloseTo(120, 0)
    expect(story.ohms('h.s', 'far.1')).not.toBeLessThan(200)
    const answer = story.answer()
    expect(answer.outcome).not.toBe('no-fault')
    expect(answer.readings[0]).toMatchObject({ agrees: false })
  })
})

describe('codes', () => {
  fact('code-circuit', () => {
    const circuit = madeCircuit(
      [
        battery,
        {
          id: 'm',
          kind: 'module',
          pins: [{ pin: '4', circuit: { type: 'pull-up', volts: 12, ohms: 1000 } }],
        },
        {
          id: 'sw',
          kind: 'switch',
          contacts: [{ id: 'x', a: 'in', b: 'out', closed: 'always' }],
        },
        { id: 'g', kind: 'ground' },
        load('lamp', 6),
      ],
      ['m.4 > sw.in', 'sw.out > g.in', 'bat.pos > lamp.a', 'lamp.b > g.in'],
      { codes: [{ code: 'B1042', failureType: '15', sites: ['wire:w1'] }] },
    )
    const story = new ToldStory(circuit)
    const without = story.answer()
    const withCode = story.answer(['B1042-15'])
    const chance = (answer: typeof without, site: string) => siteOf(answer, site).probability
    // The circuit moves up as one, wire, switch and ground alike; nothing outside it is cleared by a code.
    for (const site of ['wire:w1', 'wire:w2', 'part:sw.x'])
      expect(chance(withCode, site)).toBeGreaterThan(chance(without, site))
    expect(chance(withCode, 'wire:w1')).toBeLessThan(0.6)
    expect(chance(withCode, 'part:lamp')).toBeGreaterThan(0)
    expect(withCode.sites.every((site) => site.verdict === 'in-question')).toBe(true)
  })
})
