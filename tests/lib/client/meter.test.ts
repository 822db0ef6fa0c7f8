import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type { NextReading } from '@/diagrams/faults/answer'
import { enterReading } from '@/lib/client/meter/enter-reading'
import { type MeterAction, meterReducer, type MeterState, restMeter } from '@/lib/client/meter/meter-state'
import { cleanText } from '@/lib/client/meter/typed-text'
import { outcomeOf } from '@/lib/client/meter/outcome-of'
import { conditionWords, valueWords } from '@/lib/client/meter/reading-words'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples[0] as (typeof samples)[number]
const fuse = circuit.nodes.find((node) => node.kind === 'fuse')
const feed = `${fuse?.id}.out`

const set = (...actions: MeterAction[]): MeterState => actions.reduce(meterReducer, restMeter)

describe('the meter', () => {
  it('takes the first tapped point for the red lead and the second for the black one', () => {
    const one = set({ do: 'tap-point', point: 'f3.out' })
    expect(one).toMatchObject({ red: 'f3.out', black: 'chassis', lead: 'black' })
    expect(meterReducer(one, { do: 'tap-point', point: 'g1.in' })).toMatchObject({
      red: 'f3.out',
      black: 'g1.in',
      lead: 'red',
    })
  })

  it('keeps of what is typed only what a meter can show', () => {
    expect(cleanText('12,5x')).toBe('12.5')
    expect(cleanText('1.2.3')).toBe('1.23')
    expect(cleanText('-0.5-')).toBe('-0.5')
    expect(cleanText('ol')).toBe('OL')
  })

  it('presses keys into the figure: digits, sign, OL, and one back', () => {
    const keys = (...pressed: string[]) =>
      set(...pressed.map((key): MeterAction => ({ do: 'press', key }))).text
    expect(keys('1', '2', '.', '5')).toBe('12.5')
    expect(keys('1', 'sign')).toBe('-1')
    expect(keys('1', 'OL')).toBe('OL')
    expect(keys('OL', '3')).toBe('3')
    expect(keys('1', '2', 'erase')).toBe('1')
  })

  it('logs a reading under the id it is given, in the condition that is set', () => {
    const [control] = circuit.controls
    const turned = control?.positions.find((position) => position !== control.rest) ?? ''
    const state = set(
      { do: 'tap-point', point: feed },
      { do: 'turn', control: control?.id ?? '', position: turned },
      { do: 'type', text: '12.58' },
    )
    const entered = enterReading(circuit, state, 'r-1')
    expect(entered).toMatchObject({
      ok: true,
      reading: { id: 'r-1', kind: 'volts', red: feed, black: 'chassis', value: 12.58 },
    })
    if (entered.ok) expect(entered.reading.condition.controls).toEqual({ [control?.id ?? '']: turned })
  })

  it('asks about a slipped point and offers what was meant', () => {
    const entered = enterReading(
      circuit,
      set({ do: 'tap-point', point: feed }, { do: 'type', text: '124.5' }),
      'r',
    )
    expect(entered).toMatchObject({ ok: false, meant: '12.45' })
    if (!entered.ok) expect(entered.message).toBe("Volts: 124.5 is above this circuit's 12.6. Was it 12.45?")
  })

  it('refuses ohms on a live circuit and takes them with the battery off', () => {
    const live = set(
      { do: 'choose-kind', kind: 'ohms' },
      { do: 'tap-point', point: feed },
      { do: 'type', text: '0.4' },
    )
    const refused = enterReading(circuit, live, 'r')
    expect(refused).toMatchObject({ ok: false, about: 'condition' })
    if (!refused.ok) expect(refused.message).toMatch(/battery/i)
    expect(enterReading(circuit, meterReducer(live, { do: 'battery', connected: false }), 'r').ok).toBe(true)
  })

  it('says what is missing instead of logging half a reading', () => {
    expect(enterReading(circuit, set({ do: 'type', text: '12' }), 'r')).toMatchObject({
      ok: false,
      about: 'leads',
    })
    expect(
      enterReading(circuit, set({ do: 'tap-point', point: feed }, { do: 'type', text: '-' }), 'r'),
    ).toMatchObject({
      ok: false,
      about: 'value',
    })
  })

  it('is set by one key for the next split, leads and condition alike', () => {
    const condition = {
      controls: { key: 'on' },
      unplugged: ['c7'],
      battery: true,
      charging: false,
      added: [],
    }
    const next = {
      kind: 'volts' as const,
      red: 'a.b',
      black: 'c.d',
      condition,
      bits: 1,
      minutes: 2,
      outcomes: [],
      says: '',
    }
    expect(set({ do: 'type', text: '9' }, { do: 'set-for', next })).toMatchObject({
      kind: 'volts',
      red: 'a.b',
      black: 'c.d',
      condition,
      text: '',
    })
  })
})

describe('the outcome that a typed value falls in', () => {
  const outcomes = [
    { about: '12.5 V', low: 11.5, high: 13, probability: 0.5, leaves: ['wire:w7'] },
    { about: '0 V', low: -0.1, high: 0.4, probability: 0.4, leaves: ['wire:w5'] },
    { about: 'OL', probability: 0.1, leaves: [] },
  ]
  it('is found by its bounds, or by its name', () => {
    expect(outcomeOf(outcomes, 12.45)?.about).toBe('12.5 V')
    expect(outcomeOf(outcomes, 0)?.about).toBe('0 V')
    expect(outcomeOf(outcomes, 'OL')?.about).toBe('OL')
  })
  it('is none between them, and none before anything is typed', () => {
    expect(outcomeOf(outcomes, 6)).toBeNull()
    expect(outcomeOf(outcomes, null)).toBeNull()
  })
})

describe('readings in words', () => {
  it('give two decimals of volts and what matters of ohms', () => {
    expect(valueWords('volts', 12.583)).toBe('12.58 V')
    expect(valueWords('ohms', 0.24)).toBe('0.24 ohm')
    expect(valueWords('ohms', 4700)).toBe('4700 ohm')
    expect(valueWords('ohms', 'OL')).toBe('OL')
    expect(valueWords('works', false)).toBe('does not work')
  })
  it('name a condition by what differs from the vehicle as one finds it', () => {
    const opened = openCircuit(
      JSON.parse(readFileSync(new URL('../../fixtures/example-circuit.json', import.meta.url), 'utf8')),
    )
    if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
    const words = (condition: Partial<MeterState['condition']>) =>
      conditionWords(opened.value, { ...restMeter.condition, ...condition })
    expect(words({})).toBe('everything at rest')
    expect(words({ controls: { key: 'on' }, unplugged: ['c7'], battery: false })).toBe(
      'Key on, C7 unplugged, battery disconnected',
    )
  })
})

describe('a reading during which the harness is moved', () => {
  const moved = (...typed: [figure: 'value' | 'low' | 'high', text: string][]) =>
    set(
      { do: 'tap-point', point: feed },
      { do: 'move-harness', moved: true },
      ...typed.flatMap(([figure, text]): MeterAction[] => [
        { do: 'pick-figure', figure },
        { do: 'type', text },
      ]),
    )

  it('takes three figures: still, least and most', () => {
    const entered = enterReading(circuit, moved(['value', '12.4'], ['low', '0.2'], ['high', '12.5']), 'r')
    expect(entered).toMatchObject({
      ok: true,
      reading: { kind: 'volts', value: 12.4, moved: true, low: 0.2, high: 12.5 },
    })
  })

  it('types into the figure that is picked, by keys too', () => {
    const state = meterReducer(moved(['value', '12.4'], ['low', '0']), { do: 'press', key: '.' })
    expect(state).toMatchObject({ text: '12.4', moved: { low: '0.', high: '' }, figure: 'low' })
  })

  it('says which figure is missing or out of order', () => {
    const about = (...typed: Parameters<typeof moved>) => enterReading(circuit, moved(...typed), 'r')
    expect(about(['value', '12'])).toMatchObject({
      ok: false,
      about: 'low',
      message: 'Type the least that the meter showed while the harness was moved.',
    })
    expect(about(['value', '12'], ['low', '1'])).toMatchObject({ ok: false, about: 'high' })
    expect(about(['value', '5'], ['low', '9'], ['high', '2'])).toMatchObject({
      ok: false,
      about: 'low',
      message: 'Least 9 is above most 2. Swap the two.',
    })
    expect(about(['value', '12'], ['low', '1'], ['high', '5'])).toMatchObject({
      ok: false,
      about: 'value',
      message: 'Still 12 lies outside 1 to 5.',
    })
    expect(about(['value', '12'], ['low', '1'], ['high', '125'])).toMatchObject({
      about: 'high',
      meant: '12.5',
    })
  })

  it('hangs still again once it is logged or another kind is chosen', () => {
    const state = moved(['value', '12.4'], ['low', '0.2'], ['high', '12.5'])
    expect(meterReducer(state, { do: 'logged' })).toMatchObject({ moved: null, figure: 'value', text: '' })
    expect(meterReducer(state, { do: 'choose-kind', kind: 'ohms' })).toMatchObject({ moved: null, text: '' })
  })
})

describe('what is put in for a reading', () => {
  const lead = { from: feed, to: 'chassis', ohms: 48 }
  it('becomes part of its condition and of its words', () => {
    const state = set({ do: 'tap-point', point: feed }, { do: 'put-in', lead }, { do: 'type', text: '12.1' })
    const entered = enterReading(circuit, state, 'r')
    expect(entered).toMatchObject({ ok: true, reading: { condition: { added: [lead] } } })
    expect(conditionWords(circuit, state.condition)).toMatch(/^test lamp from .* to chassis$/)
  })
  it('comes out one by one', () => {
    const state = set({ do: 'put-in', lead }, { do: 'put-in', lead: { ...lead, ohms: 0.05 } })
    expect(meterReducer(state, { do: 'take-out', index: 0 }).condition.added).toEqual([
      { ...lead, ohms: 0.05 },
    ])
  })
})

describe('what a module reports of its input', () => {
  const fuel = samples.find((sample) => sample.title === 'Load space lamp request') as typeof circuit
  it('is high or low at one of its pins', () => {
    const state = set({ do: 'choose-kind', kind: 'sees' }, { do: 'tap-pin', pin: 'body.5' })
    expect(enterReading(fuel, state, 'r')).toMatchObject({ ok: false, message: 'Say what the module sees.' })
    expect(enterReading(fuel, meterReducer(state, { do: 'say-sees', sees: 'low' }), 'r')).toMatchObject({
      ok: true,
      reading: { kind: 'sees', pin: 'body.5', value: 'low' },
    })
  })
  it('wants a pin first, and one that is an input', () => {
    const none = set({ do: 'choose-kind', kind: 'sees' }, { do: 'say-sees', sees: 'low' })
    expect(enterReading(fuel, none, 'r')).toMatchObject({ ok: false, about: 'leads' })
    expect(enterReading(fuel, meterReducer(none, { do: 'tap-pin', pin: 'cab.7' }), 'r')).toMatchObject({
      ok: false,
      message: expect.stringMatching(/not an input of a module/),
    })
  })
  it('is what the meter is set for where the next split asks for it', () => {
    const next: NextReading = {
      kind: 'sees',
      pin: 'body.5',
      condition: restMeter.condition,
      bits: 1,
      minutes: 1,
      outcomes: [],
      says: '',
    }
    expect(set({ do: 'set-for', next })).toMatchObject({ kind: 'sees', pin: 'body.5' })
  })
})
