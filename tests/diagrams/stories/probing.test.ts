import { describe, expect } from 'vitest'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { lastAgrees, leftOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

describe('probing', () => {
  fact('back-probe', () => {
    const story = new ToldStory(lampLine(), { site: 'contact:c1-1', mode: 'resistive', ohms: 3 })
    // Both wire sides of the mated joint: its own ohms are between the leads.
    expect(story.volts('c1-1.a', keyOn)).toBeGreaterThan(12.5)
    expect(story.volts('c1-1.b', keyOn)).toBeLessThan(8.6)
    const answer = story.answer()
    expect(leftOf(answer)).toEqual(['contact:c1-1'])
    expect(answer.sites[0]!.probability).toBeGreaterThan(0.9)
  })

  fact('unmated-differs', () => {
    const story = new ToldStory(lampLine(), { site: 'contact:c1-1', mode: 'resistive', ohms: 3 })
    const apart = { unplugged: ['c1'] }
    // Opened, each half is as it should be: nothing of this speaks for or against the joint.
    expect(story.volts('c1-1.a', { ...keyOn, ...apart })).toBeCloseTo(12.6, 3)
    expect(story.ohms('c1-1.b', 'c1-2.b', apart)).toBeCloseTo(6, 1)
    const opened = story.answer()
    expect(opened.readings.every((reading) => reading.agrees)).toBe(true)
    expect(siteOf(opened, 'contact:c1-1').verdict).toBe('in-question')
    expect(siteOf(opened, 'contact:c1-2').verdict).toBe('in-question')
    expect(siteOf(opened, 'part:f1').modes.find((mode) => mode.mode === 'blown')!.probability).toBeLessThan(
      1e-3,
    )
  })

  fact('record-state', () => {
    const story = new ToldStory(lampLine(), { site: 'part:key.x', mode: 'stuck-open' })
    expect(story.volts('c1-1.a')).toBeCloseTo(0, 6)
    expect(lastAgrees(story.answer())).toBe(true)
    // The same figure with the key on is the fault itself.
    expect(story.volts('c1-1.a', keyOn)).toBeCloseTo(0, 6)
    const answer = story.answer()
    expect(answer.readings.map((reading) => reading.agrees)).toEqual([true, false])
    expect(answer.readings[0]!.expected).toBeCloseTo(0, 6)
    expect(answer.readings[1]!.expected).toBeGreaterThan(12.4)
  })

  fact('ref-ground', () => {
    const story = new ToldStory(lampLine(), { site: 'part:g1', mode: 'resistive', ohms: 3 })
    // The black lead on the nearest ground screw: nothing seems to be lost on the way back.
    expect(story.volts('lamp.b', keyOn, 'g1.in')).toBeLessThan(0.05)
    const nearest = story.answer()
    expect(lastAgrees(nearest)).toBe(true)
    expect(siteOf(nearest, 'part:g1').verdict).toBe('in-question')
    // Against chassis, which is battery minus, the ground stands high.
    expect(story.volts('g1.in', keyOn)).toBeGreaterThan(4)
    const answer = story.answer()
    expect(leftOf(answer)).toEqual(['part:g1'])
    expect(answer.sites[0]!.probability).toBeGreaterThan(0.9)
  })
})
