import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { samples } from '@/diagrams/samples/all-samples'
import { madeCircuit, onOff, whenOn } from '../../support/made-circuit'

type Loose = any

/** Small, but with one of most things: a relay, a module, a diode, an inline connector, a fuse, a switch. */
const circuit = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'f1', kind: 'fuse', amps: 10 },
    { id: 's1', kind: 'splice' },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('key') }] },
    { id: 'k1', kind: 'relay' },
    { id: 'c1-1', kind: 'cavity', connector: 'c1', number: 1 },
    { id: 'h1', kind: 'load', ohms: 12, label: 'Lamp' },
    { id: 'd1', kind: 'diode' },
    {
      id: 'm1',
      kind: 'module',
      connector: 'm1-a',
      label: 'Module',
      pins: [
        { pin: '1', circuit: { type: 'supply', ohms: 100 } },
        { pin: '2', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
        { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
        { pin: '4', circuit: { type: 'ground' } },
      ],
    },
    { id: 'g1', kind: 'ground' },
    { id: 'g2', kind: 'ground' },
  ],
  [
    'bat.pos > f1.in',
    'f1.out > s1.s',
    's1.s > k1.85',
    'k1.86 > m1.3',
    's1.s > k1.30',
    'k1.87 > c1-1.a',
    'c1-1.b > h1.a',
    'h1.b > g1.in',
    's1.s > d1.anode',
    'd1.cathode > m1.1',
    'm1.2 > sw.a',
    'sw.b > g2.in',
    'm1.4 > g2.in',
  ],
  {
    controls: [onOff('key')],
    connectors: [{ id: 'c1' }, { id: 'm1-a' }],
    sequence: [{ id: 's1' }, { id: 's2', controls: { key: 'on' } }],
    codes: [{ code: 'B1042', failureType: '13', sites: ['wire:w11'] }],
  },
)
const on: Condition = { ...restCondition, controls: { key: 'on' } }
const volts = (change: Loose = {}): Loose => ({
  id: 'r1',
  kind: 'volts',
  red: 'h1.a',
  black: 'chassis',
  condition: on,
  value: 12.4,
  ...change,
})
const open = (request: Loose) => openEvaluationRequest({ circuit, ...request })

/** Every number of an answer is one. */
function findNaN(value: unknown, path = 'answer'): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path}: ${value}`]
  if (typeof value === 'string') return /NaN|Infinity|undefined/.test(value) ? [`${path}: ${value}`] : []
  if (typeof value !== 'object' || value === null) return []
  return Object.entries(value).flatMap(([key, inner]) => findNaN(inner, `${path}.${key}`))
}

function soundAnswer(request: Loose) {
  const opened = open(request)
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
  const answer = evaluate(opened.value)
  expect(findNaN(answer)).toEqual([])
  const sum = answer.sites.reduce((total, site) => total + site.probability, answer.noFault)
  if (answer.outcome !== 'two-faults') expect(sum).toBeCloseTo(1, 6)
  return answer
}

describe('a reading that is no reading', () => {
  const dead: Condition = { ...restCondition, battery: false }
  const refused: [string, Loose, string, RegExp][] = [
    ['NaN', volts({ value: Number.NaN }), 'value', /NaN: expected a number or "OL"/],
    [
      'infinite',
      volts({ value: Infinity }),
      'value',
      /Infinity: expected a number or "OL"|expected a number/,
    ],
    ['beyond all bounds', volts({ value: 1e12 }), 'value', /1000000000000: expected at most 1000000000/],
    [
      'negative ohms',
      volts({ kind: 'ohms', value: -1, condition: dead }),
      'value',
      /ohms below zero: expected 0 or more, or OL/,
    ],
    ['a word', volts({ value: 'about twelve' }), 'value', /"about twelve": expected a number or "OL"/],
    [
      'a negative accuracy',
      volts({ accuracy: { percent: -1, floor: 0 } }),
      'accuracy.percent',
      /^-1: expected/,
    ],
    ['nowhere', volts({ red: 'h9.a' }), 'red', /point h9.a does not exist/],
    ['both leads at one place', volts({ black: 'h1.a' }), 'black', /both leads are on h1.a/],
    [
      'at the part side of a connector that is plugged in',
      volts({ red: 'm1.2:part' }),
      'red',
      /Module pin 2, part side is reachable only while its connector is unplugged/,
    ],
    [
      'ohms on a live circuit',
      volts({ kind: 'ohms', value: 3 }),
      'condition.battery',
      /Ohms needs the battery disconnected/,
    ],
    [
      'what a module sees with the battery off',
      { id: 'r1', kind: 'sees', pin: 'm1.2', value: 'low', condition: dead },
      'condition.battery',
      /Module reports nothing with the battery disconnected/,
    ],
    [
      'what a driver sees',
      { id: 'r1', kind: 'sees', pin: 'm1.3', value: 'low' },
      'pin',
      /"m1.3" is not an input of a module/,
    ],
  ]
  for (const [name, reading, path, message] of refused)
    it(`is refused: ${name}`, () => {
      const opened = open({ readings: [reading] })
      if (opened.ok) throw new Error('taken')
      expect(opened.problems[0]!.path).toBe(`readings.0.${path}`)
      expect(opened.problems[0]!.message).toMatch(message)
    })

  it('is refused under an id that is taken', () => {
    const opened = open({ readings: [volts(), volts()] })
    expect(opened.ok ? [] : opened.problems[0]!.message).toBe('reading "r1" is listed twice')
  })
})

describe('a condition that contradicts itself', () => {
  const refused: [string, Partial<Condition>, string, RegExp][] = [
    [
      'a control that is not there',
      { controls: { lights: 'on' } },
      'controls.lights',
      /control "lights" does/,
    ],
    ['a position that is not there', { controls: { key: 'half' } }, 'controls.key', /has no position "half"/],
    ['a lamp unplugged', { unplugged: ['h1'] }, 'unplugged.0', /"h1" is not a connector, fuse or relay/],
    ['a connector unplugged twice', { unplugged: ['c1', 'c1'] }, 'unplugged.1', /"c1" is unplugged twice/],
    [
      'charging without a battery',
      { battery: false, charging: true },
      'charging',
      /nothing charges with the/,
    ],
    [
      'a lead on the part side of a connector that is plugged in',
      { added: [{ from: 'm1.2:part', to: 'chassis', ohms: 0.05 }] },
      'added.0.from',
      /Module pin 2, part side is reachable only while its connector is unplugged/,
    ],
    [
      'a lead from a place to itself',
      { added: [{ from: 'h1.a', to: 'h1.a', ohms: 0.05 }] },
      'added.0.to',
      /both ends of the lead are on h1.a/,
    ],
    [
      'a lead from the battery to ground',
      { added: [{ from: 'bat.pos', to: 'chassis', ohms: 0.05 }] },
      'added.0',
      /would carry \d+ A, expected at most/,
    ],
    [
      'a lead of no ohms',
      { added: [{ from: 'h1.a', to: 'chassis', ohms: 0 }] },
      'added.0.ohms',
      /^0: expected/,
    ],
  ]
  for (const [name, change, path, message] of refused)
    it(`is refused: ${name}`, () => {
      const opened = open({ readings: [volts({ condition: { ...restCondition, ...change } })] })
      if (opened.ok) throw new Error('taken')
      expect(opened.problems[0]!.path).toBe(`readings.0.condition.${path}`)
      expect(opened.problems[0]!.message).toMatch(message)
    })

  it('is none where it only looks so: a relay pulled and bridged, a lead at an open connector', () => {
    const bridged = { ...on, unplugged: ['k1'], added: [{ from: 'k1.30', to: 'k1.87', ohms: 0.05 }] }
    const answer = soundAnswer({ readings: [volts({ condition: bridged, value: 12.3 })] })
    expect(answer.readings[0]).toMatchObject({ agrees: true })
    expect(answer.readings[0]!.expected).toBeCloseTo(12.5, 0)
    const opened = { ...on, unplugged: ['c1'], added: [{ from: 'bat.pos', to: 'c1-1.b', ohms: 0.05 }] }
    expect(soundAnswer({ readings: [volts({ condition: opened, value: 12.3 })] }).readings[0]!.agrees).toBe(
      true,
    )
  })
})

describe('a figure of another scale', () => {
  it('is named, with the figure that was probably meant', () => {
    const answer = soundAnswer({ readings: [volts({ value: 124.5 })] })
    expect(answer).toMatchObject({ outcome: 'cannot-be', reading: 'r1' })
    expect(answer.says).toContain('Was it 12.45 V?')
    const milli = soundAnswer({ readings: [volts({ value: 12_450 })] })
    expect(milli.says).toContain('Was it 12.45 V?')
  })

  it('is judged against the volts of the circuit: 24 V are right on a truck', () => {
    const truck = {
      ...circuit,
      nodes: circuit.nodes.map((node) => (node.kind === 'battery' ? { ...node, volts: 25.2 } : node)),
    }
    expect(soundAnswer({ circuit: truck, readings: [volts({ value: 24.9 })] }).outcome).not.toBe('cannot-be')
  })
})

describe('a circuit in which little can be', () => {
  it('without a source has an answer', () => {
    const bare = madeCircuit(
      [
        { id: 'h1', kind: 'load', ohms: 5 },
        { id: 'g1', kind: 'ground' },
      ],
      ['h1.b > g1.in'],
    )
    for (const readings of [[], [volts({ condition: restCondition, value: 0 })]]) {
      const answer = soundAnswer({ circuit: bare, readings })
      expect(answer.says).toMatch(/^No fault of this circuit would show: nothing in it drives a current/)
      expect(answer.sites.every((site) => site.verdict !== 'faulty')).toBe(true)
    }
    const ohms = volts({ kind: 'ohms', condition: { ...restCondition, battery: false }, value: 5 })
    soundAnswer({ circuit: bare, readings: [ohms] })
  })

  it('of nothing, or of parts without wires, has an answer', () => {
    soundAnswer({ circuit: madeCircuit([], []) })
    soundAnswer({
      circuit: madeCircuit(
        [
          { id: 'bat', kind: 'battery' },
          { id: 'h1', kind: 'load', ohms: 5 },
        ],
        [],
      ),
    })
  })

  it('in islands has an answer, and a reading across them is one like any other', () => {
    const islands = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'h1', kind: 'load', ohms: 12 },
        { id: 'g1', kind: 'ground' },
        { id: 'r1', kind: 'resistor', ohms: 50 },
        { id: 's2', kind: 'splice' },
      ],
      ['bat.pos > h1.a', 'h1.b > g1.in', 'r1.b > s2.s'],
    )
    const answer = soundAnswer({
      circuit: islands,
      readings: [volts({ condition: restCondition, red: 's2.s', black: 'bat.pos', value: 0 })],
    })
    expect(answer.readings[0]!.agrees).toBe(true)
  })

  it('on so few volts that no fault shows has an answer', () => {
    const faint = madeCircuit(
      [
        { id: 'bat', kind: 'battery', volts: 0.35 },
        { id: 'h1', kind: 'load', ohms: 12 },
        { id: 'g1', kind: 'ground' },
      ],
      ['bat.pos > h1.a', 'h1.b > g1.in'],
    )
    const answer = soundAnswer({
      circuit: faint,
      readings: [volts({ condition: restCondition, value: 0.34 })],
    })
    expect(answer.noFault).toBe(1)
  })

  it('takes a meter that is exact, and one that is hopeless', () => {
    for (const accuracy of [
      { percent: 0, floor: 0 },
      { percent: 50, floor: 1e6 },
    ])
      soundAnswer({ readings: [volts({ accuracy }), volts({ id: 'r2', red: 's1.s', value: 0, accuracy })] })
  })
})

describe('whatever is asked', () => {
  const points = ['h1.a', 'h1.b', 's1.s', 'c1-1.a', 'm1.2', 'm1.2:part', 'k1.86', 'chassis', 'x.y', '', 'h1']
  const figure = fc.oneof(
    { weight: 4, arbitrary: fc.double({ min: -20, max: 20, noNaN: true }) },
    {
      weight: 1,
      arbitrary: fc.constantFrom<Loose>(
        0,
        -0,
        'OL',
        Number.NaN,
        Infinity,
        1e9,
        -1e9,
        1e-300,
        null,
        true,
        '12',
      ),
    },
  )
  const condition = fc.record(
    {
      controls: fc.constantFrom<Loose>({}, { key: 'on' }, { key: 'off' }, { key: 'no' }, { __proto__: null }),
      unplugged: fc.subarray(['c1', 'm1-a', 'f1', 'k1', 'nothing']),
      battery: fc.boolean(),
      charging: fc.boolean(),
      added: fc.array(
        fc.record({
          from: fc.constantFrom(...points),
          to: fc.constantFrom(...points),
          ohms: fc.constantFrom(0, 0.05, 48, -1, Number.NaN),
        }),
        { maxLength: 1 },
      ),
    },
    { requiredKeys: [] },
  )
  const reading = fc.record(
    {
      id: fc.constantFrom('r1', 'r2', 'r3', ''),
      kind: fc.constantFrom('volts', 'ohms', 'amps', 'works', 'sees', 'smells'),
      red: fc.constantFrom(...points),
      black: fc.constantFrom(...points),
      wire: fc.constantFrom('w1', 'w7', 'w99'),
      node: fc.constantFrom('h1', 'k1', 'h9'),
      pin: fc.constantFrom('m1.2', 'm1.3'),
      value: figure,
      moved: fc.boolean(),
      low: figure,
      high: figure,
      accuracy: fc.constantFrom({ percent: 0, floor: 0 }, { percent: 1, floor: 0.1 }, { percent: 1 }),
      condition,
    },
    { requiredKeys: ['id', 'kind', 'value'] },
  )
  /** Only what its kind asks for, so that many pass the door. */
  const likely = fc
    .tuple(reading, fc.constantFrom('volts', 'ohms', 'amps', 'works', 'sees'), fc.nat(4))
    .map(([given, kind, n]): Loose => {
      const { id: _, moved: _m, low: _l, high: _h, ...rest } = given as Loose
      const value = kind === 'works' ? n > 2 : kind === 'sees' ? (n > 2 ? 'high' : 'low') : rest.value
      const of: Loose = {
        volts: { red: 'h1.a', black: 'chassis' },
        ohms: { red: 'h1.a', black: 'h1.b' },
        amps: { wire: 'w7' },
        works: { node: 'h1' },
        sees: { pin: 'm1.2' },
      }
      const battery = kind !== 'ohms'
      const swing =
        kind === 'volts' && n === 0 && typeof value === 'number'
          ? { moved: true, low: value - n - 3, high: value }
          : {}
      return {
        id: `r${n}`,
        kind,
        value: typeof value === 'number' && kind === 'ohms' ? Math.abs(value) : value,
        ...of[kind],
        ...swing,
        condition: { controls: n % 2 ? { key: 'on' } : {}, battery },
      }
    })
  const mostly = (sound: Loose[], unsound: Loose[]): fc.Arbitrary<Loose> =>
    fc.oneof(
      { weight: 12, arbitrary: fc.constantFrom(...sound) },
      { weight: 1, arbitrary: fc.constantFrom(...unsound) },
    )
  const request = fc.record(
    {
      readings: fc.oneof(
        { weight: 1, arbitrary: fc.array(reading, { maxLength: 3 }) },
        {
          weight: 5,
          arbitrary: fc.uniqueArray(likely, { maxLength: 4, selector: (each: Loose): string => each.id }),
        },
      ),
      codes: mostly([[], ['B1042-13'], ['B1042', 'U0100-87']], [['nonsense'], 'B1042']),
      priors: mostly(['trade', 'even'], ['other']),
      odds: mostly(
        [{}, { classes: { wire: { open: 1e6, resistive: 1e-6 } } }],
        [{ classes: { wire: { open: -1 } } }, 5],
      ),
      symptoms: mostly([[], [{ node: 'h1', does: 'not-work' }], [{ step: 's2' }]], [[{ node: 'x' }]]),
    },
    { requiredKeys: ['readings'] },
  )

  it('is answered soundly or refused by name, and never throws', () => {
    let answered = 0
    fc.assert(
      fc.property(request, (asked) => {
        const opened = open(asked)
        if (!opened.ok) {
          for (const { path, message } of opened.problems) {
            expect(typeof path).toBe('string')
            expect(message.length).toBeGreaterThan(3)
          }
          return
        }
        answered++
        soundAnswer(asked)
      }),
      { numRuns: Number(process.env.GARBAGE_RUNS ?? 150), seed: 20 },
    )
    expect(answered).toBeGreaterThan(10)
  }, 240_000)

  it('of any shape at all is refused by name', () => {
    fc.assert(
      fc.property(fc.anything(), (asked) => {
        const opened = openEvaluationRequest(asked)
        expect(opened.ok).toBe(false)
      }),
      { seed: 21 },
    )
  })

  it('of the samples has no figure that is none, whatever their first reading says', () => {
    for (const sample of samples.slice(0, 3)) {
      const load = sample.nodes.find((node) => node.kind === 'load')
      const wire = sample.wires[0]!
      for (const value of [0, -12, 12.4, 1e9])
        soundAnswer({
          circuit: sample,
          readings: [
            { id: 'r1', kind: 'volts', red: wire.to, black: 'chassis', value },
            { id: 'r2', kind: 'amps', wire: wire.id, value },
            ...(load ? [{ id: 'r3', kind: 'works', node: load.id, value: value > 0 }] : []),
          ],
        })
    }
  }, 120_000)
})
