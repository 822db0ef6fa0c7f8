import { describe, expect } from 'vitest'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { faultyOf, lastAgrees, leftOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

describe('testing under load', () => {
  fact('load-on', () => {
    const story = new ToldStory(lampLine(), { site: 'contact:c1-2', mode: 'resistive', ohms: 2 })
    expect(story.volts('c1-2.b', {}, 'c1-2.a')).toBeCloseTo(0, 6)
    const idle = story.answer()
    expect(lastAgrees(idle)).toBe(true)
    expect(siteOf(idle, 'contact:c1-2').verdict).toBe('in-question')
    expect(story.volts('c1-2.b', keyOn, 'c1-2.a')).toBeGreaterThan(2.5)
    const loaded = story.answer()
    expect(lastAgrees(loaded)).toBe(false)
    expect(leftOf(loaded)).toEqual(['contact:c1-2'])
  })

  fact('ohms-miss', () => {
    // Half an ohm within the 5 % of a 12 ohm heater.
    const story = new ToldStory(lampLine(12), { site: 'contact:c1-1', mode: 'resistive', ohms: 0.5 })
    expect(story.ohms('f1.out', 'chassis', keyOn)).toBeCloseTo(12.5, 0)
    const byOhms = story.answer()
    expect(lastAgrees(byOhms)).toBe(true)
    expect(siteOf(byOhms, 'contact:c1-1').verdict).toBe('in-question')
    expect(story.volts('c1-1.a', keyOn, 'c1-1.b')).toBeGreaterThan(0.45)
    const loaded = story.answer()
    expect(lastAgrees(loaded)).toBe(false)
    expect(leftOf(loaded)).toEqual(['contact:c1-1'])
  })

  fact('unloaded-passes', () => {
    const story = new ToldStory(lampLine(), { site: 'contact:c1-1', mode: 'resistive', ohms: 100 })
    const open = { ...keyOn, unplugged: ['c2'] }
    // 100 ohm of corrosion before 10 Mohm: a thousandth of a per cent is lost.
    expect(story.volts('lamp.a', open)).toBeCloseTo(12.6, 3)
    const unloaded = story.answer()
    expect(lastAgrees(unloaded)).toBe(true)
    const joint = siteOf(unloaded, 'contact:c1-1')
    expect(joint.verdict).toBe('in-question')
    expect(joint.modes.find((mode) => mode.mode === 'resistive')!.probability).toBeGreaterThan(0.01)
    expect(joint.modes.find((mode) => mode.mode === 'open')!.probability).toBeLessThan(0.001)
    // A test lamp of 48 ohm decides.
    const lead = [{ from: 'lamp.a', to: 'chassis', ohms: 48 }]
    expect(story.volts('lamp.a', { ...open, added: lead })).toBeCloseTo((12.6 * 48) / 148, 1)
    expect(story.volts('c1-1.a', { ...open, added: lead })).toBeGreaterThan(12.5)
    expect(story.volts('c1-1.b', { ...open, added: lead })).toBeLessThan(5)
    const loaded = story.answer()
    expect(faultyOf(loaded)).toEqual(['contact:c1-1'])
    expect(siteOf(loaded, 'contact:c1-1').modes[0]!.ohms!).toBeGreaterThan(60)
    expect(siteOf(loaded, 'contact:c1-1').modes[0]!.ohms!).toBeLessThan(160)
  })

  fact('sub-load', () => {
    const story = new ToldStory(lampLine(1.2), { site: 'wire:w3', mode: 'resistive', ohms: 0.6 })
    const real = story.volts('key.out', keyOn, 'c1-1.a')
    const standIn = story.volts(
      'key.out',
      { ...keyOn, unplugged: ['c2'], added: [{ from: 'lamp.a', to: 'chassis', ohms: 1.2 }] },
      'c1-1.a',
    )
    expect(standIn / real).toBeCloseTo(1, 1)
    const answer = story.answer()
    expect(answer.readings.map((reading) => reading.agrees)).toEqual([false, false])
    expect(faultyOf(answer)).toEqual(['wire:w3'])
  })

  fact('one-strand', () => {
    const story = new ToldStory(lampLine(1.2), { site: 'wire:w4', mode: 'resistive', ohms: 2 })
    // A continuity buzzer takes 2 ohm for a wire, and a voltmeter on the unplugged end sees the battery.
    expect(story.volts('lamp.a', { ...keyOn, unplugged: ['c2'] })).toBeCloseTo(12.6, 3)
    expect(story.works('lamp', keyOn)).toBe(false)
    expect(siteOf(story.answer(), 'wire:w4').verdict).toBe('in-question')
    expect(story.volts('c1-1.b', keyOn, 'lamp.a')).toBeGreaterThan(7)
    const answer = story.answer()
    expect(leftOf(answer)).toEqual(['wire:w4'])
    expect(siteOf(answer, 'wire:w4').modes[0]!.mode).toBe('resistive')
  })
})
