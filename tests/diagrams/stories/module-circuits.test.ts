import { describe, expect } from 'vitest'
import { keyOn } from '@/tests/support/lamp-line'
import type { NodeInput } from '@/tests/support/harness-draft'
import { madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'
import { faultyOf, leftOf, shareOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

const battery: NodeInput = { id: 'bat', kind: 'battery' }
const ground: NodeInput = { id: 'g', kind: 'ground', label: 'G2' }
const switched = (id: string): NodeInput => ({
  id,
  kind: 'switch',
  contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }],
})
const controls = { controls: [onOff('key')] }

/** A module's input pulled up to 12 V, a plug, a switch to ground. */
const pulledUp = madeCircuit(
  [
    battery,
    {
      id: 'm',
      kind: 'module',
      pins: [{ pin: '4', circuit: { type: 'pull-up', volts: 12, ohms: 1000 } }],
    },
    { id: 'c5-1', kind: 'cavity', connector: 'c5', number: 1 },
    switched('sw'),
    ground,
  ],
  ['m.4 > c5-1.a', 'c5-1.b > sw.in', 'sw.out > g.in'],
  { ...controls, connectors: [{ id: 'c5', cavities: 1 }] },
)

describe('inputs of a module', () => {
  fact('low-side', () => {
    const good = new ToldStory(pulledUp)
    expect(good.volts('m.4')).toBeCloseTo(12, 1)
    expect(good.sees('m.4')).toBe('high')
    expect(good.volts('m.4', keyOn)).toBeLessThan(0.05)
    expect(good.sees('m.4', keyOn)).toBe('low')
    expect(good.answer().readings.every((reading) => reading.agrees)).toBe(true)

    // The switch is closed and the input stays high: 12 V up to the switch and on its far side say ground.
    const story = new ToldStory(pulledUp, { site: 'wire:w3', mode: 'open' })
    expect(story.sees('m.4', keyOn)).toBe('high')
    expect(story.volts('sw.in', keyOn)).toBeGreaterThan(11.5)
    expect(story.volts('sw.out', keyOn)).toBeGreaterThan(11.5)
    expect(story.volts('g.in', keyOn)).toBeLessThan(0.05)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['wire:w3'])
    expect(siteOf(answer, 'part:sw.x').verdict).toBe('proved-good')
  })

  fact('high-side-in', () => {
    const circuit = madeCircuit(
      [
        battery,
        switched('sw'),
        { id: 'm', kind: 'module', pins: [{ pin: '4', circuit: { type: 'pull-down', ohms: 4700 } }] },
      ],
      ['bat.pos > sw.in', 'sw.out > m.4'],
      controls,
    )
    const good = new ToldStory(circuit)
    expect(good.volts('m.4')).toBeLessThan(0.01)
    expect(good.sees('m.4')).toBe('low')
    expect(good.volts('m.4', keyOn)).toBeGreaterThan(12.5)
    expect(good.sees('m.4', keyOn)).toBe('high')

    const story = new ToldStory(circuit, { site: 'part:sw.x', mode: 'stuck-closed' })
    expect(story.sees('m.4')).toBe('high')
    expect(story.volts('m.4')).toBeGreaterThan(12.5)
    const answer = story.answer()
    // A supply on the wire does the same; what breaks the feed cannot.
    expect(leftOf(answer)).toContain('part:sw.x')
    expect(siteOf(answer, 'part:sw.x').modes[0]!.mode).toBe('stuck-closed')
    expect(siteOf(answer, 'wire:w1').modes[0]!.mode).toMatch(/^short/)
  })

  fact('pull-bias', () => {
    const story = new ToldStory(pulledUp, { site: 'wire:w1', mode: 'open' })
    expect(story.volts('m.4')).toBeCloseTo(12, 1)
    expect(story.volts('c5-1.a')).toBeLessThan(0.2)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['wire:w1'])
    expect(siteOf(answer, 'pin:m.4').verdict).toBe('proved-good')
  })

  fact('sensor-5v', () => {
    // A three-wire sensor at its middle, as two halves of 2 kohm; the signal to an input of the module.
    const sensor = madeCircuit(
      [
        battery,
        {
          id: 'm',
          kind: 'module',
          pins: [
            { pin: '1', circuit: { type: 'source', volts: 5, ohms: 5 } },
            { pin: '2', circuit: { type: 'pull-down', ohms: 500_000 } },
            { pin: '3', circuit: { type: 'ground' } },
          ],
        },
        { id: 'up', kind: 'resistor', ohms: 2000 },
        { id: 'wiper', kind: 'splice' },
        { id: 'down', kind: 'resistor', ohms: 2000 },
        ground,
      ],
      [
        'm.1 > up.a', // w1: reference
        'up.b > wiper.s',
        'wiper.s > down.a',
        'wiper.s > m.2', // w4: signal
        'down.b > g.in', // w5: ground
        'm.3 > g.in',
      ],
    )
    expect(new ToldStory(sensor).volts('m.2')).toBeCloseTo(2.5, 1)
    // Outside 0.5 to 4.5 V: low without its reference or signal, high without its ground.
    for (const wire of ['wire:w1', 'wire:w4'])
      expect(new ToldStory(sensor, { site: wire, mode: 'open' }).volts('m.2')).toBeLessThan(0.5)
    const story = new ToldStory(sensor, { site: 'wire:w5', mode: 'open' })
    expect(story.volts('m.2')).toBeGreaterThan(4.5)
    expect(story.volts('down.b')).toBeGreaterThan(4.5)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['wire:w5'])
    expect(siteOf(answer, 'pin:m.1').verdict).toBe('proved-good')
  })

  fact('ref-shared', () => {
    const shared = madeCircuit(
      [
        battery,
        { id: 'm', kind: 'module', pins: [{ pin: '1', circuit: { type: 'source', volts: 5, ohms: 20 } }] },
        { id: 's', kind: 'splice' },
        ...['s1', 's2', 's3'].map(
          (id): NodeInput => ({
            id,
            kind: 'resistor',
            ohms: 2000,
            connector: `c${id}`,
            cavities: { a: 1, b: 2 },
          }),
        ),
        ground,
      ],
      ['m.1 > s.s', 's.s > s1.a', 's.s > s2.a', 's.s > s3.a', 's1.b > g.in', 's2.b > g.in', 's3.b > g.in'],
      { connectors: ['cs1', 'cs2', 'cs3'].map((id) => ({ id, cavities: 2 })) },
    )
    const story = new ToldStory(shared, { site: 'part:s2', mode: 'shorted', ohms: 0.5 })
    expect(story.volts('m.1')).toBeLessThan(0.2)
    expect(story.volts('m.1', { unplugged: ['cs1'] })).toBeLessThan(0.2)
    expect(story.volts('m.1', { unplugged: ['cs2'] })).toBeGreaterThan(4.7)
    const answer = story.answer()
    expect(leftOf(answer)).toContain('part:s2')
    expect(answer.sites[0]!.site).toBe('part:s2')
    for (const good of ['part:s1', 'part:s3', 'wire:w1', 'pin:m.1'])
      expect(siteOf(answer, good).verdict).toBe('proved-good')
  })
})

describe('drivers of a module', () => {
  const module = (circuit: { type: 'low-side' | 'high-side'; on: ReturnType<typeof whenOn> }): NodeInput => ({
    id: 'm',
    kind: 'module',
    pins: [
      { pin: '1', circuit: { type: 'supply', ohms: 200 } },
      { pin: '2', circuit: { type: 'ground' } },
      { pin: '3', circuit },
    ],
  })

  fact('low-side-drv', () => {
    const circuit = madeCircuit(
      [
        battery,
        module({ type: 'low-side', on: whenOn('key') }),
        { id: 'lamp', kind: 'load', ohms: 12 },
        ground,
      ],
      ['bat.pos > m.1', 'm.2 > g.in', 'bat.pos > lamp.a', 'lamp.b > m.3'],
      controls,
    )
    const good = new ToldStory(circuit)
    expect(good.volts('lamp.a')).toBeGreaterThan(12.5)
    expect(good.volts('lamp.b')).toBeGreaterThan(12.5)
    expect(good.volts('lamp.b', keyOn)).toBeLessThan(0.2)

    const story = new ToldStory(circuit, { site: 'pin:m.3', mode: 'dead' })
    expect(story.volts('lamp.b', keyOn)).toBeGreaterThan(12.5)
    expect(story.volts('m.3', keyOn)).toBeGreaterThan(12.5)
    expect(story.volts('m.1', keyOn)).toBeGreaterThan(12.5)
    expect(story.volts('m.2', keyOn)).toBeLessThan(0.1)
    const answer = story.answer()
    // Feed, ground and wire stand well: what is left is inside.
    expect(shareOf(answer, ['pin:m.1', 'pin:m.2', 'pin:m.3', 'module:m'])).toBeGreaterThan(0.99)
    for (const good of ['wire:w1', 'wire:w4', 'part:lamp'])
      expect(siteOf(answer, good).verdict).toBe('proved-good')
    expect(answer.sites[0]!.site).toBe('pin:m.3')
  })

  fact('high-side-drv', () => {
    const circuit = madeCircuit(
      [
        battery,
        module({ type: 'high-side', on: whenOn('key') }),
        { id: 'lamp', kind: 'load', ohms: 12 },
        ground,
      ],
      ['bat.pos > m.1', 'm.2 > g.in', 'm.3 > lamp.a', 'lamp.b > g.in'],
      controls,
    )
    const good = new ToldStory(circuit)
    expect(good.volts('lamp.a')).toBeLessThan(0.01)
    expect(good.volts('lamp.a', keyOn)).toBeGreaterThan(12)
    expect(good.volts('lamp.b', keyOn)).toBeLessThan(0.05)

    const story = new ToldStory(circuit, { site: 'wire:w3', mode: 'open' })
    expect(story.volts('m.3', keyOn)).toBeGreaterThan(12)
    expect(story.volts('lamp.a', keyOn)).toBeLessThan(0.01)
    expect(faultyOf(story.answer())).toEqual(['wire:w3'])
  })

  fact('driver-leak', () => {
    // The driver's own check for an open load: 100 kohm to 12 V beside it.
    const checked = madeCircuit(
      [
        battery,
        {
          id: 'm',
          kind: 'module',
          pins: [
            { pin: '1', circuit: { type: 'supply', ohms: 200 } },
            { pin: '2', circuit: { type: 'ground' } },
            { pin: '3', circuit: { type: 'high-side', on: whenOn('key') } },
            { pin: '4', circuit: { type: 'pull-up', volts: 12, ohms: 100_000 } },
          ],
        },
        { id: 's', kind: 'splice' },
        { id: 'lamp', kind: 'load', ohms: 12, connector: 'cl', cavities: { a: 1, b: 2 } },
        ground,
      ],
      ['bat.pos > m.1', 'm.2 > g.in', 'm.3 > s.s', 'm.4 > s.s', 's.s > lamp.a', 'lamp.b > g.in'],
      { ...controls, connectors: [{ id: 'cl', cavities: 2 }] },
    )
    const story = new ToldStory(checked)
    const open = { unplugged: ['cl'] }
    expect(story.volts('lamp.a', open)).toBeGreaterThan(11.5)
    expect(
      story.volts('lamp.a', { ...open, added: [{ from: 'lamp.a', to: 'chassis', ohms: 48 }] }),
    ).toBeLessThan(0.02)
    const answer = story.answer()
    expect(answer.readings.every((reading) => reading.agrees)).toBe(true)
    // Volts on a line that is switched off, and nobody calls it a stuck driver.
    const stuck = siteOf(answer, 'pin:m.3').modes.find((mode) => mode.mode === 'stuck-on')!
    expect(stuck.probability).toBeLessThan(1e-3)
  })
})
