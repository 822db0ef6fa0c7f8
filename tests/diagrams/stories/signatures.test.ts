import { describe, expect } from 'vitest'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'
import { faultyOf, lastAgrees, leftOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

const switched = (id: string) => ({
  id,
  kind: 'switch' as const,
  contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn(id) }],
})

describe('how faults show', () => {
  fact('open-feed', () => {
    const story = new ToldStory(lampLine(), { site: 'wire:w4', mode: 'open' })
    expect(story.works('lamp', keyOn)).toBe(false)
    expect(story.volts('lamp.a', keyOn)).toBeLessThan(0.01)
    expect(story.volts('c1-1.b', keyOn)).toBeGreaterThan(12.5)
    const answer = story.answer()
    expect(answer.outcome).toBe('located')
    expect(faultyOf(answer)).toEqual(['wire:w4'])
    expect(siteOf(answer, 'wire:w4').modes[0]!.mode).toBe('open')
    expect(siteOf(answer, 'part:f1').verdict).toBe('proved-good')
  })

  fact('open-ground', () => {
    const story = new ToldStory(lampLine(), { site: 'wire:w6', mode: 'open' })
    expect(story.works('lamp', keyOn)).toBe(false)
    expect(story.volts('lamp.a', keyOn)).toBeGreaterThan(12.4)
    expect(story.volts('lamp.b', keyOn)).toBeGreaterThan(12.3)
    const halfway = story.answer()
    // Volts on both sides: the feed and the lamp are proved, the way to ground is left.
    for (const good of ['part:f1', 'wire:w4', 'part:lamp'])
      expect(siteOf(halfway, good).verdict).toBe('proved-good')
    for (const left of ['wire:w6', 'part:g1', 'contact:c1-2'])
      expect(siteOf(halfway, left).verdict).toBe('in-question')
    expect(story.volts('c1-2.a', keyOn)).toBeGreaterThan(12.3)
    expect(story.volts('g1.in', keyOn)).toBeLessThan(0.01)
    expect(faultyOf(story.answer())).toEqual(['wire:w6'])
  })

  fact('short-gnd-pre', () => {
    const before = new ToldStory(lampLine(), { site: 'wire:w3', mode: 'short-to-ground', ohms: 0.05 })
    expect(before.volts('f1.in')).toBeGreaterThan(12.5)
    expect(before.volts('f1.out')).toBeLessThan(0.01)
    const shorted = siteOf(before.answer(), 'wire:w3').modes.find((mode) => mode.mode === 'short-to-ground')!
    expect(shorted.blows).toEqual(['f1'])

    const lowSide = lowSideLamp()
    const after = new ToldStory(lowSide, { site: 'wire:w2', mode: 'short-to-ground', ohms: 0.05 })
    expect(after.works('lamp', {})).toBe(true)
    expect(lastAgrees(after.answer())).toBe(false)
    // Parted at C3 the lamp burns on: the short is on its side.
    expect(after.works('lamp', { unplugged: ['c3'] })).toBe(true)
    expect(after.volts('c3-1.a', { unplugged: ['c3'] })).toBeLessThan(0.2)
    const answer = after.answer()
    expect(answer.outcome).toBe('located')
    expect(faultyOf(answer)).toEqual(['wire:w2'])
    expect(siteOf(answer, 'wire:w2').modes[0]).toMatchObject({ mode: 'short-to-ground', blows: [] })
    expect(siteOf(answer, 'pin:m.3').verdict).toBe('proved-good')
  })

  fact('short-batt', () => {
    const behindSwitch = new ToldStory(lampLine(), { site: 'wire:w4', mode: 'short-to-supply', ohms: 0.05 })
    expect(behindSwitch.works('lamp')).toBe(true)
    expect(behindSwitch.volts('c1-1.a', { unplugged: ['c1'] })).toBeLessThan(0.01)
    expect(behindSwitch.volts('c1-1.b', { unplugged: ['c1'] })).toBeGreaterThan(12)
    const first = behindSwitch.answer()
    expect(faultyOf(first)).toEqual(['wire:w4'])
    expect(siteOf(first, 'wire:w4').modes[0]!.mode).toBe('short-to-supply')

    const control = new ToldStory(lowSideLamp(), { site: 'wire:w3', mode: 'short-to-supply', ohms: 0.05 })
    expect(control.works('lamp', keyOn)).toBe(false)
    // The driver is on and cannot hold the wire down.
    expect(control.volts('m.3', keyOn)).toBeGreaterThan(5)
    expect(control.amps('w3', keyOn)).toBeLessThan(1)
    const second = control.answer()
    expect(second.sites[0]!.site).toBe('wire:w3')
    expect(second.sites[0]!.modes[0]!.mode).toBe('short-to-supply')
  })

  fact('high-res', () => {
    const story = new ToldStory(lampLine(), { site: 'contact:c1-1', mode: 'resistive', ohms: 4 })
    expect(story.works('lamp', keyOn)).toBe(false)
    expect(story.volts('c1-1.a', keyOn, 'c1-1.b')).toBeGreaterThan(4)
    // One figure alone may be a slip: nothing else is left, but it takes a second test to be sure.
    expect(leftOf(story.answer())).toEqual(['contact:c1-1'])
    expect(story.amps('w4', keyOn)).toBeLessThan(1.4)
    const answer = story.answer()
    expect(answer.outcome).toBe('located')
    expect(faultyOf(answer)).toEqual(['contact:c1-1'])
    expect(siteOf(answer, 'contact:c1-1').modes[0]!.mode).toBe('resistive')
    expect(siteOf(answer, 'contact:c1-1').modes[0]!.ohms!).toBeGreaterThan(2.5)
    expect(siteOf(answer, 'contact:c1-1').modes[0]!.ohms!).toBeLessThan(6)
  })

  fact('backfeed', () => {
    // Tail and brake lamp left on one ground, tail lamp right on another; the left ground is lost.
    const rear = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        switched('tail'),
        switched('brake'),
        { id: 't', kind: 'splice' },
        { id: 'tail-l', kind: 'load', ohms: 24, style: 'lamp' },
        { id: 'tail-r', kind: 'load', ohms: 24, style: 'lamp' },
        { id: 'brake-l', kind: 'load', ohms: 7, style: 'lamp' },
        { id: 's', kind: 'splice' },
        { id: 'gl', kind: 'ground' },
        { id: 'gr', kind: 'ground' },
      ],
      [
        'bat.pos > tail.in', // w1
        'tail.out > t.s', // w2
        't.s > tail-l.a', // w3
        't.s > tail-r.a', // w4
        'tail-l.b > s.s', // w5
        'tail-r.b > gr.in', // w6
        'bat.pos > brake.in', // w7
        'brake.out > brake-l.a', // w8
        'brake-l.b > s.s', // w9
        's.s > gl.in', // w10
      ],
      { controls: [onOff('tail'), onOff('brake')] },
    )
    const braking = { controls: { brake: 'on' } }
    const story = new ToldStory(rear, { site: 'part:gl', mode: 'open' })
    // With only the brake on, the brake lamp's amperes go backwards through the left tail lamp into the right one.
    expect(story.works('brake-l', braking)).toBe(false)
    expect(story.volts('tail-r.a', braking)).toBeGreaterThan(4)
    expect(story.amps('w3', braking)).toBeLessThan(-0.15)
    expect(story.volts('s.s', braking)).toBeGreaterThan(9)
    expect(story.volts('gl.in', braking)).toBeGreaterThan(9)
    const answer = story.answer()
    expect(answer.outcome).toBe('located')
    expect(faultyOf(answer)).toEqual(['part:gl'])
    for (const good of ['part:tail-l', 'wire:w8', 'part:gr'])
      expect(siteOf(answer, good).verdict).toBe('proved-good')
  })

  fact('cross-circuit', () => {
    const two = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        switched('left'),
        switched('right'),
        { id: 'c1', kind: 'cavity', connector: 'x1', number: 1 },
        { id: 'c2', kind: 'cavity', connector: 'x1', number: 2 },
        { id: 'la', kind: 'load', ohms: 6 },
        { id: 'lb', kind: 'load', ohms: 6 },
        { id: 'g', kind: 'ground' },
      ],
      [
        'bat.pos > left.in', // w1
        'left.out > c1.a', // w2
        'c1.b > la.a', // w3
        'la.b > g.in', // w4
        'bat.pos > right.in', // w5
        'right.out > c2.a', // w6
        'c2.b > lb.a', // w7
        'lb.b > g.in', // w8
      ],
      { controls: [onOff('left'), onOff('right')], connectors: [{ id: 'x1', cavities: 2 }] },
    )
    // The key's own wire is open as it were: nobody has turned it on, and yet the lamp is lit by the other switch.
    const story = new ToldStory(two, { site: 'wire:w3', mode: 'short-to-wire', other: 'w7', ohms: 0.1 })
    expect(story.works('la', {})).toBe(false)
    expect(story.works('la', { controls: { right: 'on' } })).toBe(true)
    expect(story.volts('c1.a', { controls: { right: 'on' }, unplugged: ['x1'] })).toBeLessThan(0.01)
    expect(story.ohms('c1.b', 'c2.b', { unplugged: ['x1'] })).toBeLessThan(0.2)
    const answer = story.answer()
    expect(answer.outcome).toBe('located')
    expect(faultyOf(answer).toSorted()).toEqual(['wire:w3', 'wire:w7'])
    expect(siteOf(answer, 'wire:w3').modes[0]).toMatchObject({ mode: 'short-to-wire', other: 'w7' })
  })
})

/** A lamp with a steady feed, switched to ground by a module through connector C3. */
function lowSideLamp() {
  return madeCircuit(
    [
      { id: 'bat', kind: 'battery' },
      { id: 'lamp', kind: 'load', ohms: 6 },
      { id: 'c3-1', kind: 'cavity', connector: 'c3', number: 1 },
      {
        id: 'm',
        kind: 'module',
        pins: [{ pin: '3', circuit: { type: 'low-side', on: whenOn('key') } }],
      },
    ],
    ['bat.pos > lamp.a', 'lamp.b > c3-1.a', 'c3-1.b > m.3'],
    { controls: [onOff('key')], connectors: [{ id: 'c3', cavities: 1 }] },
  )
}
