import { describe, expect, it } from 'vitest'
import { readingSchema, type ReadingValue } from '@/diagrams/document/reading-schema'
import { readingSentence } from '@/diagrams/faults/reading-sentence'
import { lampLine } from '@/tests/support/lamp-line'
import { madeCircuit } from '@/tests/support/made-circuit'

const line = lampLine()
const said = (
  what: Record<string, unknown>,
  expected: ReadingValue | null,
  agrees: boolean,
  { above = false, circuit = line } = {},
) => readingSentence(circuit, readingSchema.parse({ id: 'r1', ...what }), expected, agrees, above)

const volts = (value: number, red = 'lamp.a', black = 'chassis') => ({ kind: 'volts', red, black, value })
const ohms = (value: number | 'OL') => ({ kind: 'ohms', red: 'c1-1.a', black: 'c1-1.b', value })
const amps = (value: number) => ({ kind: 'amps', wire: 'w4', value })

describe('a reading that agrees', () => {
  it.each<[Record<string, unknown>, ReadingValue, string]>([
    [volts(12.48), 12.5, 'Lamp a: 12.48 V, as in a good circuit (12.50 V).'],
    [volts(11.9), 12.5, 'Lamp a: 11.90 V, within the limits of a good circuit (12.50 V).'],
    [volts(-0.001), 0, 'Lamp a: 0.00 V, as in a good circuit (0.00 V).'],
    [ohms('OL'), 'OL', 'C1 cavity 1, side a to C1 cavity 1, side b: OL, as in a good circuit (OL).'],
    [amps(2.08), 2.07, 'Wire C1 cavity 1 to Lamp a: 2.08 A, as in a good circuit (2.07 A).'],
    [{ kind: 'works', node: 'lamp', value: true }, true, 'Lamp: works, as it should.'],
    [{ kind: 'works', node: 'lamp', value: false }, false, 'Lamp: does not work, as it should not.'],
  ])('%j', (what, expected, sentence) => expect(said(what, expected, true)).toBe(sentence))
})

describe('a reading that does not', () => {
  it.each<[string, Record<string, unknown>, ReadingValue, string]>([
    [
      'no volts',
      volts(0.01),
      12.5,
      'Lamp a: 0.01 V, a good circuit has 12.50 V. No feed gets here, or it is held to ground.',
    ],
    [
      'few volts',
      volts(8.36),
      12.5,
      'Lamp a: 8.36 V, a good circuit has 12.50 V. 4.14 V is lost on the way.',
    ],
    [
      'volts where there should be none',
      volts(4.2, 'lamp.b'),
      0.02,
      'Lamp b: 4.20 V, a good circuit has 0.02 V. The way to ground is poor, or a supply gets in.',
    ],
    [
      'more volts than a loaded feed has',
      volts(12.6),
      11.4,
      'Lamp a: 12.60 V, a good circuit has 11.40 V. Less is drawn than should be, or a supply gets in.',
    ],
    [
      'volts across a joint',
      volts(5.01, 'c1-1.a', 'c1-1.b'),
      0.01,
      'C1 cavity 1, side a to C1 cavity 1, side b: 5.01 V, a good circuit has 0.01 V. That is lost between the two.',
    ],
    [
      'none across a load',
      volts(0, 'lamp.a', 'lamp.b'),
      12.4,
      'Lamp a to Lamp b: 0.00 V, a good circuit has 12.40 V. No current runs here, or the two are joined.',
    ],
    [
      'few across a load',
      volts(7.5, 'lamp.a', 'lamp.b'),
      12.4,
      'Lamp a to Lamp b: 7.50 V, a good circuit has 12.40 V. 4.90 V is missing between the two.',
    ],
    [
      'too many across a load',
      volts(12.4, 'lamp.a', 'lamp.b'),
      8.1,
      'Lamp a to Lamp b: 12.40 V, a good circuit has 8.10 V. 4.30 V too much stands between the two.',
    ],
    [
      'the other sign',
      volts(-12.4, 'lamp.a', 'lamp.b'),
      12.4,
      'Lamp a to Lamp b: -12.40 V, a good circuit has 12.40 V. The leads are swapped, or the current runs the other way.',
    ],
    [
      'ohms too high',
      ohms('OL'),
      0.005,
      'C1 cavity 1, side a to C1 cavity 1, side b: OL, a good circuit has 0.0 ohm. The way is open or poor.',
    ],
    [
      'ohms too low',
      ohms(0.3),
      1000,
      'C1 cavity 1, side a to C1 cavity 1, side b: 0.3 ohm, a good circuit has 1.00 kohm. Something joins what should be apart.',
    ],
    [
      'no amperes',
      amps(0),
      2.07,
      'Wire C1 cavity 1 to Lamp a: 0.00 A, a good circuit has 2.07 A. The way is open.',
    ],
    [
      'few amperes',
      amps(1.2),
      2.07,
      'Wire C1 cavity 1 to Lamp a: 1.20 A, a good circuit has 2.07 A. The way is poor, or part of it is open.',
    ],
    [
      'many amperes',
      amps(9),
      2.07,
      'Wire C1 cavity 1 to Lamp a: 9.00 A, a good circuit has 2.07 A. More is drawn than should be.',
    ],
    [
      'amperes backwards',
      amps(-0.4),
      2.07,
      'Wire C1 cavity 1 to Lamp a: -0.40 A, a good circuit has 2.07 A. The current runs the other way.',
    ],
    [
      'a load that stands',
      { kind: 'works', node: 'lamp', value: false },
      true,
      'Lamp: does not work, though it should.',
    ],
    [
      'a load that runs',
      { kind: 'works', node: 'lamp', value: true },
      false,
      'Lamp: works, though it should not.',
    ],
  ])('%s', (_, what, expected, sentence) => expect(said(what, expected, false)).toBe(sentence))
})

describe('what a module reports of its input', () => {
  const circuit = madeCircuit(
    [
      {
        id: 'm',
        kind: 'module',
        label: 'M1',
        pins: [{ pin: '4', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } }],
      },
      { id: 's', kind: 'splice' },
    ],
    ['m.4 > s.s'],
  )
  const sees = { kind: 'sees', pin: 'm.4', value: 'low' }
  it('is named as what the module sees', () => {
    expect(said(sees, 'low', true, { circuit })).toBe('M1 pin 4: the module sees low, as it should.')
    expect(said(sees, 'high', false, { circuit })).toBe('M1 pin 4: the module sees low, it should see high.')
  })
})

describe('a reading that says nothing', () => {
  it('above any source', () => {
    expect(said(volts(124.5), 12.5, false, { above: true })).toBe(
      'Lamp a: 124.50 V is above any source of this circuit. Check the leads and the range.',
    )
  })
  it('in a condition that does not come to rest', () => {
    expect(said(volts(6), null, true)).toBe(
      'Lamp a: 6.00 V. The good circuit does not come to rest in this condition, so nothing follows.',
    )
  })
})
