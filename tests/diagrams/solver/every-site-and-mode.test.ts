import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import { sitesOf, type Mode } from '@/diagrams/document/sites'
import type { OperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import type { NodeInput } from '@/tests/support/harness-draft'
import { madeCircuit, onOff, operate, whenOn } from '@/tests/support/made-circuit'

/**
 * Known answers by Ohm’s law on paper, one for each kind of place and each way it can fail. One long table in one
 * file, so that a test can see whether it is whole.
 */

const on = { controls: { key: 'on' } }
const beside = (a: number, b: number) => 1 / (1 / a + 1 / b)
const switched = (id: string): NodeInput => ({
  id,
  kind: 'switch',
  contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }],
})

/** One loop: battery, fuse, switch, inline cavity, lamp behind a plug, splice, ground. */
const loop = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'f', kind: 'fuse', amps: 10 },
    switched('sw'),
    { id: 'c', kind: 'cavity', connector: 'x1', number: 1 },
    { id: 'lamp', kind: 'load', ohms: 6, connector: 'x2', cavities: { a: 1, b: 2 } },
    { id: 's', kind: 'splice' },
    { id: 'g', kind: 'ground' },
  ],
  [
    'bat.pos > f.in', // w1
    'f.out > sw.in', // w2
    'sw.out > c.a', // w3
    'c.b > lamp.a', // w4
    'lamp.b > s.s', // w5
    's.s > g.in', // w6
  ],
  {
    controls: [onOff('key')],
    connectors: [
      { id: 'x1', cavities: 1 },
      { id: 'x2', cavities: 2 },
    ],
  },
)
/** Ohm of its feed up to the middle of w3, and of the way from there to chassis. */
const feedOhms = 0.02 + 0.001 + 0.008 + 0.001 + 0.02 + 0.0005
const backOhms = 0.0005 + 0.005 + 0.001 + 0.005 + 6 + 0.005 + 0.001 + 0.001 + 0.002
const loopOhms = feedOhms + backOhms

/** A feed, a resistor and a diode in one loop. */
const fed = madeCircuit(
  [
    { id: 'fd', kind: 'feed' },
    { id: 'r', kind: 'resistor', ohms: 60 },
    { id: 'd', kind: 'diode' },
    { id: 'g', kind: 'ground' },
  ],
  ['fd.out > r.a', 'r.b > d.anode', 'd.cathode > g.in'],
)
const fedOhms = 0.05 + 60 + 0.01 + 0.003 + 0.002

const relay = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    switched('sw'),
    { id: 'k', kind: 'relay' },
    { id: 'lamp', kind: 'load', ohms: 6 },
    { id: 'g', kind: 'ground' },
    { id: 'g2', kind: 'ground' },
  ],
  ['bat.pos > sw.in', 'sw.out > k.86', 'k.85 > g.in', 'bat.pos > k.30', 'k.87 > lamp.a', 'lamp.b > g2.in'],
  { controls: [onOff('key')] },
)

/** Two resistors of 10 ohm whose wires lie side by side in one connector. */
const pair = madeCircuit(
  [
    { id: 'fd', kind: 'feed' },
    { id: 'c1', kind: 'cavity', connector: 'x', number: 1 },
    { id: 'c2', kind: 'cavity', connector: 'x', number: 2 },
    { id: 'r1', kind: 'resistor', ohms: 10 },
    { id: 'r2', kind: 'resistor', ohms: 10 },
    { id: 'g', kind: 'ground' },
    { id: 'end', kind: 'splice' },
  ],
  ['fd.out > c1.a', 'c1.b > r1.a', 'r1.b > g.in', 'end.s > c2.a', 'c2.b > r2.a', 'r2.b > g.in'],
  { connectors: [{ id: 'x', cavities: 2 }] },
)

/** One pin of each circuit, each with something on its line. */
const module = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    {
      id: 'm',
      kind: 'module',
      pins: [
        { pin: '1', circuit: { type: 'supply', ohms: 100 } },
        { pin: '2', circuit: { type: 'ground' } },
        { pin: '3', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
        { pin: '4', circuit: { type: 'pull-down', ohms: 1000 } },
        { pin: '5', circuit: { type: 'low-side', on: whenOn('key') } },
        { pin: '6', circuit: { type: 'high-side', on: whenOn('key') } },
        { pin: '7', circuit: { type: 'source', volts: 5, ohms: 10, on: whenOn('key') } },
        { pin: '8', circuit: { type: 'bridge', to: '9', ohms: 120 } },
        { pin: '9', circuit: { type: 'none' } },
      ],
    },
    { id: 'r3', kind: 'resistor', ohms: 1000 },
    { id: 'r4', kind: 'resistor', ohms: 1000 },
    { id: 'l5', kind: 'load', ohms: 50 },
    { id: 'l6', kind: 'load', ohms: 50 },
    { id: 'r7', kind: 'resistor', ohms: 90 },
    { id: 'r8', kind: 'resistor', ohms: 120 },
    { id: 'g', kind: 'ground' },
    { id: 'gm', kind: 'ground' },
  ],
  [
    'bat.pos > m.1', // w1
    'm.2 > gm.in', // w2
    'm.3 > r3.a', // w3
    'r3.b > g.in', // w4
    'bat.pos > r4.a', // w5
    'r4.b > m.4', // w6
    'bat.pos > l5.a', // w7
    'l5.b > m.5', // w8
    'm.6 > l6.a', // w9
    'l6.b > g.in', // w10
    'm.7 > r7.a', // w11
    'r7.b > g.in', // w12
    'bat.pos > r8.a', // w13
    'r8.b > m.8', // w14
    'm.9 > g.in', // w15
  ],
  { controls: [onOff('key')] },
)

/** What is read off the operating point, and how close arithmetic without the wiring's milliohms comes to it. */
interface Look {
  at: (found: OperatingPoint) => number
  floor: number
}
const volts = (point: string): Look => ({ at: (found) => found.volts.get(point)!, floor: 4e-3 })
const amps = (wire: string): Look => ({ at: (found) => found.wireAmps.get(wire)!, floor: 1e-5 })
const pulled: Look = { at: (found) => Number(found.relays.get('k')), floor: 0 }
const awake: Look = { at: (found) => Number(found.modules.get('m')), floor: 0 }
const agree = (look: Look, found: OperatingPoint, expected: number) => {
  expect(Math.abs(look.at(found) - expected)).toBeLessThanOrEqual(2e-3 * Math.abs(expected) + look.floor)
}

type Row = [circuit: Circuit, fault: PlantedFault, change: Partial<Condition>, look: Look, expected: number]

/** Series places of the loop: 2 ohm more, or a break. */
const inLoop = [
  'wire:w2',
  'contact:c',
  'contact:lamp.a',
  'part:lamp',
  'part:s',
  'part:g',
  'part:bat',
].flatMap((site): Row[] => [
  [loop, { site, mode: 'open' }, on, amps('w6'), 0],
  [loop, { site, mode: 'resistive', ohms: 2 }, on, amps('w6'), 12.6 / (loopOhms + 2)],
])

/** Volts of the module's inner ground, awake with the key off, with so many siemens to chassis. */
const hangsAt = (siemens: number) =>
  (12.6 / 100 + 12.6 / 2000 - 5 / 2000) / (1 / 100 + 1 / 2000 + 1 / 100 + 1 / 2000 + siemens)

const rows: Row[] = [
  ...inLoop,
  // 5 ohm beside the lamp, from the middle of w3: volts divide between the feed and both together.
  [
    loop,
    { site: 'wire:w3', mode: 'short-to-ground', ohms: 5 },
    on,
    amps('w6'),
    (12.6 * beside(5, backOhms)) / (feedOhms + beside(5, backOhms)) / backOhms,
  ],
  // From the battery's plus past the open switch.
  [loop, { site: 'wire:w3', mode: 'short-to-supply', ohms: 2 }, {}, amps('w6'), 12.6 / (0.02 + 2 + backOhms)],
  // The second resistor has no feed but through 5 ohm from the first one's wire.
  [
    pair,
    { site: 'wire:w2', mode: 'short-to-wire', other: 'w5', ohms: 5 },
    {},
    amps('w6'),
    (12.6 * beside(10, 15)) / (0.05 + beside(10, 15)) / 15,
  ],
  [loop, { site: 'part:f', mode: 'blown' }, on, amps('w6'), 0],
  [loop, { site: 'part:f', mode: 'resistive', ohms: 2 }, on, amps('w6'), 12.6 / (loopOhms + 2)],
  [
    loop,
    { site: 'part:lamp', mode: 'shorted', ohms: 3 },
    on,
    amps('w6'),
    12.6 / (loopOhms - 6 + beside(6, 3)),
  ],
  // 0.1 ohm across its own 0.02 ohm: 10.5 V behind 0.0167 ohm.
  [
    loop,
    { site: 'part:bat', mode: 'shorted', ohms: 0.1 },
    on,
    amps('w6'),
    (12.6 * 0.1) / 0.12 / (loopOhms - 0.02 + beside(0.02, 0.1)),
  ],
  [loop, { site: 'part:bat', mode: 'weak', volts: 9 }, on, amps('w6'), 9 / loopOhms],
  [loop, { site: 'part:sw.x', mode: 'stuck-open' }, on, amps('w6'), 0],
  [loop, { site: 'part:sw.x', mode: 'stuck-closed' }, {}, amps('w6'), 12.6 / loopOhms],
  [loop, { site: 'part:sw.x', mode: 'resistive', ohms: 2 }, on, amps('w6'), 12.6 / (loopOhms + 2)],

  [fed, { site: 'part:fd', mode: 'open' }, {}, amps('w3'), 0],
  [fed, { site: 'part:fd', mode: 'resistive', ohms: 20 }, {}, amps('w3'), 11.9 / (fedOhms + 20)],
  [fed, { site: 'part:r', mode: 'open' }, {}, amps('w3'), 0],
  [fed, { site: 'part:r', mode: 'resistive', ohms: 20 }, {}, amps('w3'), 11.9 / (fedOhms + 20)],
  [
    fed,
    { site: 'part:r', mode: 'shorted', ohms: 10 },
    {},
    amps('w3'),
    11.9 / (fedOhms - 60 + beside(60, 10)),
  ],
  [fed, { site: 'part:d', mode: 'open' }, {}, amps('w3'), 0],
  [fed, { site: 'part:d', mode: 'resistive', ohms: 20 }, {}, amps('w3'), 11.9 / (fedOhms + 20)],
  // Below 0.7 V the diode stays open beside its short of 1 ohm.
  [fed, { site: 'part:d', mode: 'shorted', ohms: 1 }, {}, amps('w3'), 12.6 / (fedOhms - 0.01 + 1)],

  [relay, { site: 'part:k.coil', mode: 'open' }, on, pulled, 0],
  [relay, { site: 'part:k.coil', mode: 'open' }, on, amps('w3'), 0],
  // It draws its amperes and more, and does not pull in.
  [relay, { site: 'part:k.coil', mode: 'shorted', ohms: 10 }, on, pulled, 0],
  [
    relay,
    { site: 'part:k.coil', mode: 'shorted', ohms: 10 },
    on,
    amps('w3'),
    12.6 / (0.02 + 0.001 + 0.02 + 0.001 + beside(85, 10) + 0.001 + 0.002),
  ],
  [relay, { site: 'part:k.contact', mode: 'stuck-open' }, on, amps('w6'), 0],
  [
    relay,
    { site: 'part:k.contact', mode: 'stuck-closed' },
    {},
    amps('w6'),
    12.6 / (0.02 + 0.001 + 0.02 + 0.001 + 6 + 0.001 + 0.002),
  ],
  // The coil's 0.15 A costs the battery 3 mV.
  [
    relay,
    { site: 'part:k.contact', mode: 'resistive', ohms: 2 },
    on,
    amps('w6'),
    (12.6 * beside(85.025, 8.025)) / (0.02 + beside(85.025, 8.025)) / 8.025,
  ],

  [module, { site: 'pin:m.1', mode: 'open' }, on, awake, 0],
  // 12.6 V over 100 ohm of supply and 20 ohm before it, and the lamp's 50 ohm behind the high side.
  [
    module,
    { site: 'pin:m.1', mode: 'resistive', ohms: 20 },
    on,
    volts('m.6'),
    (12.6 * beside(100, 50.1)) / (20 + beside(100, 50.1)) / (50.1 / 50),
  ],
  // Without its ground the module hangs between the battery, over its supply and its pull-down, and what its
  // pins lead to: 100 ohm behind its resting source, 2 kohm behind its pull-up, which still stands 5 V above it.
  [module, { site: 'pin:m.2', mode: 'open' }, {}, volts('m.7'), 0.9 * hangsAt(0)],
  [module, { site: 'pin:m.2', mode: 'resistive', ohms: 10 }, {}, amps('w2'), hangsAt(1 / 10) / 10],
  [module, { site: 'pin:m.3', mode: 'open' }, {}, volts('m.3'), 0],
  [module, { site: 'pin:m.3', mode: 'resistive', ohms: 500 }, {}, volts('m.3'), (5 * 1000) / 2500],
  [module, { site: 'pin:m.3', mode: 'dead' }, {}, volts('m.3'), 0],
  [module, { site: 'pin:m.4', mode: 'open' }, {}, volts('m.4'), 12.6],
  [module, { site: 'pin:m.4', mode: 'resistive', ohms: 500 }, {}, volts('m.4'), (12.6 * 1500) / 2500],
  [module, { site: 'pin:m.5', mode: 'open' }, on, volts('m.5'), 12.6],
  [module, { site: 'pin:m.5', mode: 'resistive', ohms: 50 }, on, volts('m.5'), (12.6 * 50.1) / 100.1],
  [module, { site: 'pin:m.5', mode: 'dead' }, on, volts('m.5'), 12.6],
  [module, { site: 'pin:m.5', mode: 'stuck-on' }, {}, volts('m.5'), (12.6 * 0.1) / 50.1],
  [module, { site: 'pin:m.6', mode: 'open' }, on, volts('m.6'), 0],
  [module, { site: 'pin:m.6', mode: 'resistive', ohms: 50 }, on, volts('m.6'), (12.6 * 50) / 100.1],
  [module, { site: 'pin:m.6', mode: 'dead' }, on, volts('m.6'), 0],
  [module, { site: 'pin:m.6', mode: 'stuck-on' }, {}, volts('m.6'), (12.6 * 50) / 50.1],
  [module, { site: 'pin:m.7', mode: 'open' }, on, volts('m.7'), 0],
  [module, { site: 'pin:m.7', mode: 'resistive', ohms: 100 }, on, volts('m.7'), (5 * 90) / 200],
  [module, { site: 'pin:m.7', mode: 'dead' }, on, volts('m.7'), 0],
  [module, { site: 'pin:m.7', mode: 'stuck-on' }, {}, volts('m.7'), (5 * 90) / 100],
  [module, { site: 'pin:m.8', mode: 'open' }, {}, amps('w15'), 0],
  [module, { site: 'pin:m.8', mode: 'resistive', ohms: 60 }, {}, amps('w15'), 12.6 / 300],
  [module, { site: 'module:m', mode: 'dead' }, on, awake, 0],
  [module, { site: 'module:m', mode: 'dead' }, on, volts('m.6'), 0],
  // Its supply draws on, its 5 V is gone behind its own ohms.
  [module, { site: 'module:m', mode: 'dead' }, {}, amps('w1'), 12.6 / 100],
]

describe('a known answer for each place and mode', () => {
  it.each(
    rows.map(([circuit, fault, ...rest]) => [fault.site, fault.mode, circuit, fault, ...rest] as const),
  )('%s, %s', (_, __, circuit, fault, change, look, expected) =>
    agree(look, operate(circuit, change, fault), expected),
  )
})

describe('the list is whole', () => {
  const kindOf = (circuit: Circuit, site: string): string => {
    const [kind, rest] = site.split(':') as [string, string]
    const [nodeId, tail] = rest.split('.') as [string, string | undefined]
    const node = circuit.nodes.find((each) => each.id === nodeId)
    if (kind === 'contact') return node?.kind === 'cavity' ? 'inline contact' : 'part contact'
    if (kind === 'part') return `${node!.kind}${node!.kind === 'relay' ? ` ${tail}` : ''}`
    if (kind === 'pin' && node?.kind === 'module')
      return `${node.pins.find((pin) => pin.pin === tail)!.circuit.type} pin`
    return kind
  }
  const known = new Set(rows.map(([circuit, fault]) => `${kindOf(circuit, fault.site)}, ${fault.mode}`))

  it('holds every mode of every kind of place of these circuits', () => {
    const missing = new Set<string>()
    for (const circuit of [loop, fed, relay, pair, module])
      for (const site of sitesOf(circuit))
        for (const mode of site.modes) {
          const key = `${kindOf(circuit, site.id)}, ${mode satisfies Mode}`
          if (!known.has(key)) missing.add(key)
        }
    expect([...missing]).toEqual([])
  })

  it('which are all that the format’s page lists', () => {
    expect(known.size).toBe(5 + 2 * 2 + 2 + 3 * 3 + 3 * 2 + 4 + 3 + 2 + 3 + 2 + 2 + 3 + 2 + 4 * 3 + 2 + 1)
  })
})

describe('each pin circuit in each of its states', () => {
  const asleep: PlantedFault = { site: 'wire:w1', mode: 'open' }
  it.each<[string, string, Partial<Condition>, PlantedFault | undefined, Look, number]>([
    ['supply', 'always', {}, undefined, amps('w1'), 12.6 / 100],
    ['ground', 'always', {}, undefined, volts('m.2'), 0],
    ['pull-up', 'awake', {}, undefined, volts('m.3'), 2.5],
    ['pull-up', 'asleep', {}, asleep, volts('m.3'), 0],
    ['pull-down', 'awake', {}, undefined, volts('m.4'), 6.3],
    ['pull-down', 'asleep', {}, asleep, volts('m.4'), 6.3],
    ['low-side', 'on', on, undefined, volts('m.5'), (12.6 * 0.1) / 50.1],
    ['low-side', 'off', {}, undefined, volts('m.5'), 12.6],
    ['low-side', 'asleep', on, asleep, volts('m.5'), 12.6],
    ['high-side', 'on', on, undefined, volts('m.6'), (12.6 * 50) / 50.1],
    ['high-side', 'off', {}, undefined, volts('m.6'), 0],
    ['high-side', 'asleep', on, asleep, volts('m.6'), 0],
    ['source', 'on', on, undefined, volts('m.7'), 4.5],
    ['source', 'off', {}, undefined, volts('m.7'), 0],
    ['source', 'asleep', on, asleep, volts('m.7'), 0],
    ['bridge', 'awake', {}, undefined, amps('w15'), 12.6 / 240],
    ['bridge', 'asleep', {}, asleep, amps('w15'), 12.6 / 240],
    ['none', 'always', {}, undefined, volts('m.9'), 0],
  ])('%s, %s', (_, __, change, fault, look, expected) =>
    agree(look, operate(module, change, fault), expected),
  )

  it('a high side takes its volts from the supply pin it names', () => {
    const two = (from: string) =>
      operate(
        madeCircuit(
          [
            { id: 'a', kind: 'feed', volts: 12 },
            { id: 'b', kind: 'feed', volts: 9 },
            {
              id: 'm',
              kind: 'module',
              pins: [
                { pin: '1', circuit: { type: 'supply', ohms: 100 } },
                { pin: '2', circuit: { type: 'supply', ohms: 100 } },
                { pin: '3', circuit: { type: 'high-side', from } },
              ],
            },
            { id: 'r', kind: 'resistor', ohms: 1000 },
            { id: 'g', kind: 'ground' },
          ],
          ['a.out > m.1', 'b.out > m.2', 'm.3 > r.a', 'r.b > g.in'],
        ),
      ).volts.get('m.3')!
    expect(two('1')).toBeCloseTo(12, 1)
    expect(two('2')).toBeCloseTo(9, 1)
  })
})
