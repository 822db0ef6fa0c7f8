import { describe, expect, it } from 'vitest'
import type { Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'
import { ToldStory } from '@/tests/support/told-story'

const line = lampLine()

describe('narrowed', () => {
  it('counts what is left and says between which points it lies', () => {
    const story = new ToldStory(line, { site: 'wire:w4', mode: 'open' })
    story.volts('key.out', keyOn)
    story.volts('lamp.a', keyOn)
    expect(story.answer().says).toMatch(
      /^\d places left of 15\. All are between Key out and Lamp a\. Most likely: C1 cavity 1, \d\d %\.$/,
    )
  })
  it('names the likeliest where what is left does not hang together', () => {
    const story = new ToldStory(line, { site: 'wire:w4', mode: 'open' })
    story.works('lamp', keyOn)
    expect(story.answer().says).toMatch(
      /^15 places left of 15\. Most likely: .*, \d+ %; .*, \d+ %; .*, \d+ %\./,
    )
  })
  it('with one place left asks for a second reading of another kind', () => {
    const story = new ToldStory(line, { site: 'contact:c1-1', mode: 'resistive', ohms: 4 })
    story.volts('c1-1.a', keyOn, 'c1-1.b')
    expect(story.answer().says).toMatch(
      /^1 place left of 15: C1 cavity 1, 9\d %\. 5\.01 V is lost there under load\. Take one more reading there, of another kind, before anything is renewed\.$/,
    )
  })
  it('says what would separate places that no reading tells apart, once they hold most of the odds', () => {
    const circuit = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        {
          id: 'm',
          kind: 'module',
          label: 'M2',
          pins: [
            { pin: '1', circuit: { type: 'supply', ohms: 200 } },
            { pin: '2', circuit: { type: 'ground' } },
            { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
          ],
        },
        { id: 'lamp', kind: 'load', ohms: 12, label: 'Lamp' },
        { id: 'g', kind: 'ground', label: 'G5' },
      ],
      ['bat.pos > m.1', 'm.2 > g.in', 'bat.pos > lamp.a', 'lamp.b > m.3'],
      { controls: [onOff('key')] },
    )
    const story = new ToldStory(circuit, { site: 'pin:m.3', mode: 'dead' })
    for (const point of ['lamp.b', 'm.3', 'm.1', 'm.2']) story.volts(point, keyOn)
    story.ohms('m.1', 'chassis')
    const { says } = story.answer()
    expect(says).toMatch(
      /M2 pin 3 and M2 look the same from outside and cannot be told apart by any reading\./,
    )
    expect(says).toMatch(
      /(Prove the feeds and grounds of M2, then it is the module|Before replacing M2: .*)\.$/,
    )
  })
})

describe('nothing wrong', () => {
  it('names the conditions tried and promises nothing beyond them', () => {
    const answer: Answer = evaluate({
      circuit: line,
      readings: goodReadings(),
      codes: [],
      priors: 'trade',
    })
    expect(answer.outcome).toBe('no-fault')
    expect(answer.says).toBe(
      `Nothing wrong in the conditions tried: Key on; everything at rest; battery disconnected and C2 unplugged. ${answer.readings.length} readings are as in a good circuit. A fault that shows at other times is not ruled out.`,
    )
  })
})

describe('cannot be', () => {
  /** Four readings of an open feed wire, one of them replaced. */
  const withSlip = (index: number, change: object): Answer => {
    const story = new ToldStory(line, { site: 'wire:w3', mode: 'open' })
    story.volts('key.out', keyOn)
    story.volts('c1-1.a', keyOn)
    story.volts('lamp.a', keyOn)
    story.works('lamp', keyOn)
    const readings = story.readings.map((reading, r) => (r === index ? { ...reading, ...change } : reading))
    return evaluate({ circuit: line, readings: readings as Reading[], codes: [], priors: 'trade' })
  }

  it('names the reading that fits nothing and what to check before it is taken again', () => {
    const answer = withSlip(2, { value: 12.4 })
    expect(answer).toMatchObject({ outcome: 'cannot-be', reading: 'r3' })
    expect(answer.says).toBe(
      'R3 fits no fault in this circuit: Lamp a, 12.40 V. Check the leads, and that it was taken with Key on, and take it again.',
    )
  })
  it('with a value above any source asks for the figure with its point further left', () => {
    const answer = withSlip(0, { value: 124.5 })
    expect(answer).toMatchObject({ outcome: 'cannot-be', reading: 'r1' })
    expect(answer.says).toBe(
      'R1 cannot be: Key out, 124.50 V is above any source of this circuit, 12.80 V at most. Was it 12.45 V? If not, check the leads and take it again.',
    )
  })
  it('takes millivolts for volts where that is what the good circuit shows', () => {
    const answer = withSlip(0, { value: 12_580 })
    expect(answer.says).toContain('Was it 12.58 V?')
  })
  it('asks for the other scale of an ohms reading where only that would be good', () => {
    const story = new ToldStory(lampLine(470))
    story.works('lamp', keyOn)
    story.volts('lamp.a', keyOn, 'lamp.b')
    story.amps('w4', keyOn)
    story.ohms('lamp.a:part', 'lamp.b:part', { unplugged: ['c2'] })
    const last = { ...story.readings[3]!, value: 0.47 } as Reading
    const answer = evaluate({
      circuit: story.circuit,
      readings: [...story.readings.slice(0, 3), last],
      codes: [],
      priors: 'trade',
    })
    expect(answer).toMatchObject({ outcome: 'cannot-be', reading: 'r4' })
    expect(answer.says).toContain('Was it 470 ohm?')
    expect(answer.says).toContain('that it was taken with battery disconnected and C2 unplugged')
  })
})

function goodReadings(): Reading[] {
  const story = new ToldStory(line)
  story.works('lamp', keyOn)
  story.volts('lamp.a', keyOn, 'lamp.b')
  story.works('lamp')
  story.ohms('lamp.a:part', 'lamp.b:part', { unplugged: ['c2'] })
  story.amps('w4', keyOn)
  story.volts('f1.in', keyOn)
  return story.readings
}
