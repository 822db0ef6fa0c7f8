import { describe, expect } from 'vitest'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { inCondition, madeCircuit } from '@/tests/support/made-circuit'
import { faultyOf, lastAgrees, leftOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

const open = { ...keyOn, unplugged: ['c2'] }
const testLamp = { ...open, added: [{ from: 'lamp.a', to: 'chassis', ohms: 48 }] }

describe('what the meter shows', () => {
  fact('ghost', () => {
    // The wire is as good as gone, and yet 10 Mohm see the battery through it.
    const story = new ToldStory(lampLine(), { site: 'wire:w3', mode: 'resistive', ohms: 50_000 })
    expect(story.volts('lamp.a', open)).toBeGreaterThan(12.5)
    expect(siteOf(story.answer(), 'wire:w3').verdict).toBe('in-question')
    expect(story.volts('lamp.a', testLamp)).toBeLessThan(0.05)
    expect(story.volts('c1-1.a', testLamp)).toBeLessThan(0.05)
    expect(story.volts('key.out', testLamp)).toBeGreaterThan(12.5)
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['wire:w3'])
    expect(siteOf(answer, 'wire:w3').modes[0]).toMatchObject({ mode: 'resistive' })
    expect(siteOf(answer, 'wire:w3').modes[0]!.ohms!).toBeGreaterThan(5_000)

    // A true open of 1 Gohm leaves a hundredth of the battery's volts on the meter.
    const gone = new ToldStory(lampLine(), { site: 'wire:w3', mode: 'open', ohms: 1e9 })
    expect(gone.volts('lamp.a', open)).toBeCloseTo(12.6 / 101, 3)
    expect(gone.answer().readings[0]!.agrees).toBe(false)
  })

  fact('ol-meaning', () => {
    const story = new ToldStory(lampLine(), { site: 'wire:w4', mode: 'open', ohms: 1e9 })
    expect(story.ohms('c1-1.b', 'lamp.a')).toBe('OL')
    // What shows OL still lets a tenth of a volt through to 10 Mohm.
    expect(story.volts('lamp.a', open)).toBeGreaterThan(0.1)
    const answer = story.answer()
    expect(answer.outcome).not.toBe('cannot-be')
    expect(answer.sites[0]!.site).toBe('wire:w4')

    // And where the good circuit shows OL, it condemns nothing.
    const good = new ToldStory(lampLine())
    expect(good.ohms('c1-1.a', 'c1-1.b', { unplugged: ['c1'] })).toBe('OL')
    expect(lastAgrees(good.answer())).toBe(true)
  })

  fact('zero-leads', () => {
    const circuit = lampLine()
    // 0.18 ohm of leads on a wire of a milliohm: inside the meter's 0.2 ohm, so nothing is suspected.
    const withLeads = { id: 'r1', kind: 'ohms', red: 'c1-1.b', black: 'lamp.a', value: 0.18 } as const
    const condition = inCondition({ battery: false })
    const judge = (accuracy?: { percent: number; floor: number }) =>
      evaluate({
        circuit,
        readings: [readingSchema.parse({ ...withLeads, condition, accuracy })],
        codes: [],
        priors: 'trade',
      }).readings[0]!.agrees
    expect(judge()).toBe(true)
    // A meter that has had its leads taken off is held to what it can do.
    expect(judge({ percent: 0.5, floor: 0.02 })).toBe(false)
  })

  fact('parallel-ohms', () => {
    const pair = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 's', kind: 'splice' },
        { id: 'left', kind: 'load', ohms: 24, connector: 'cl' },
        { id: 'right', kind: 'load', ohms: 24, connector: 'cr' },
        { id: 'g', kind: 'ground' },
      ],
      ['bat.pos > s.s', 's.s > left.a', 's.s > right.a', 'left.b > g.in', 'right.b > g.in'],
      {
        connectors: [
          { id: 'cl', cavities: 2 },
          { id: 'cr', cavities: 2 },
        ],
      },
    )
    const story = new ToldStory(pair, { site: 'part:left', mode: 'open' })
    // In the circuit the broken lamp still reads as the other one.
    expect(story.ohms('left.a', 'left.b')).toBeCloseTo(24, 0)
    const parallel = story.answer()
    expect(parallel.readings[0]!.expected).toBeCloseTo(12, 1)
    expect(siteOf(parallel, 'part:right').verdict).toBe('in-question')
    expect(story.ohms('left.a:part', 'left.b:part', { unplugged: ['cl'] })).toBe('OL')
    const answer = story.answer()
    expect(faultyOf(answer)).toEqual(['part:left'])
  })

  fact('diode-dir', () => {
    const line = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'd', kind: 'diode', label: 'D1' },
        { id: 'lamp', kind: 'load', ohms: 12 },
        { id: 'g', kind: 'ground' },
      ],
      ['bat.pos > d.anode', 'd.cathode > lamp.a', 'lamp.b > g.in'],
    )
    const good = new ToldStory(line)
    // The meter on ohms cannot drive a diode: OL both ways, and that is good.
    expect(good.ohms('d.anode', 'd.cathode')).toBe('OL')
    expect(good.ohms('d.cathode', 'd.anode')).toBe('OL')
    expect(good.volts('d.anode', {}, 'd.cathode')).toBeCloseTo(0.7, 1)
    expect(good.answer().readings.every((reading) => reading.agrees)).toBe(true)

    const shorted = new ToldStory(line, { site: 'part:d', mode: 'shorted', ohms: 0.1 })
    expect(shorted.ohms('d.anode', 'd.cathode')).toBeCloseTo(0.1, 4)
    expect(shorted.volts('d.anode', {}, 'd.cathode')).toBeLessThan(0.2)
    // A supply touching the wire behind the diode would read the same; the clamp tells which way the amperes go.
    expect(leftOf(shorted.answer()).toSorted()).toEqual(['part:d', 'wire:w1', 'wire:w2'])
    expect(shorted.amps('w2')).toBeCloseTo(1.04, 1)
    expect(leftOf(shorted.answer())).toEqual(['part:d'])
  })

  fact('cold-lamp', () => {
    const story = new ToldStory(lampLine(6, 0.6))
    expect(story.ohms('lamp.a:part', 'lamp.b:part', { unplugged: ['c2'] })).toBeCloseTo(0.6, 6)
    // 12.6 V over 0.6 ohm would be 21 A; the running lamp takes a tenth of that.
    expect(story.amps('w5', keyOn)).toBeCloseTo(2.08, 1)
    const answer = story.answer()
    expect(answer.readings.every((reading) => reading.agrees)).toBe(true)
    expect(siteOf(answer, 'part:lamp').verdict).toBe('proved-good')
  })
})
