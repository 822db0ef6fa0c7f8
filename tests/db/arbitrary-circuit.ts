import fc from 'fast-check'
import { cautions } from '@/diagrams/document/circuit-schema'
import { loadStyles } from '@/diagrams/document/node-schema'

// Documents of every kind of part with every optional field there or not, in any script, in shuffled order: what
// storing must bring back. They are valid; whether they make electrical sense does not matter here.

// PostgreSQL keeps every character but NUL, and halves of a pair are no text.
const text = (most: number) =>
  fc
    .string({ unit: 'grapheme', maxLength: Math.min(most, 12) })
    .filter((s) => !/\0|\p{Surrogate}/u.test(s) && s.length <= most)
const label = text(120)
// JSON writes minus zero as zero.
const amount = (min: number, max: number) =>
  fc.double({ min, max, noNaN: true, noDefaultInfinity: true }).map((x) => (x === 0 ? 0 : x))
const positive = amount(1e-9, 1e12)
const optional = <K extends string, V>(key: K, value: fc.Arbitrary<V>) =>
  fc.option(value, { nil: undefined }).map((v) => (v === undefined ? {} : { [key]: v }))

const controls = [
  { id: 'key', label: 'Key', positions: ['off', 'on', 'start'], rest: 'off' },
  { id: 'SW_5', label: '', positions: ['up', 'down'], rest: 'up' },
]
const when = fc.oneof(
  fc.constant('always'),
  fc.constant('never'),
  fc.constant({ control: 'key', positions: ['on', 'start'] }),
)
const setting = fc.constantFrom({}, { key: 'on' }, { SW_5: 'down', key: 'start' })

const pinCircuit = fc.oneof(
  fc.record({ type: fc.constant('supply'), ohms: positive }),
  fc.constant({ type: 'ground' }),
  fc.record({ type: fc.constant('pull-up'), volts: amount(0, 1000), ohms: positive }),
  fc.record({ type: fc.constant('low-side'), on: when, onOhms: positive }),
  fc.record({ type: fc.constant('source'), volts: amount(0, 1000), ohms: positive, on: when }),
  fc.constant({ type: 'none' }),
)

const particulars: fc.Arbitrary<Record<string, unknown>>[] = [
  fc.record({ kind: fc.constant('battery'), volts: amount(0, 1000), ohms: positive }),
  fc.record({ kind: fc.constant('feed'), live: when }),
  fc.constant({ kind: 'ground' }),
  fc.record({ kind: fc.constant('fuse'), amps: amount(0.1, 2000), style: fc.constantFrom('blade', 'link') }),
  fc.record({
    kind: fc.constant('switch'),
    contacts: fc.constant([
      { id: 'lo', a: '1', b: '2', closed: 'never' },
      { id: 'hi', a: '1', b: '3+', closed: { control: 'SW_5', positions: ['down'] } },
    ]),
  }),
  fc.record({ kind: fc.constant('relay'), suppression: fc.constantFrom('none', 'resistor', 'diode') }),
  fc
    .tuple(optional('coldOhms', positive), positive, fc.constantFrom(...loadStyles))
    .map(([cold, ohms, style]) => ({ kind: 'load', ohms, style, ...cold })),
  fc.record({ kind: fc.constant('resistor'), ohms: positive }),
  fc.constant({ kind: 'diode' }),
  fc.constant({ kind: 'splice' }),
  fc
    .array(fc.tuple(pinCircuit, label, optional('threshold', amount(0, 1000))), {
      minLength: 1,
      maxLength: 6,
    })
    .map((pins) => ({
      kind: 'module',
      pins: pins.map(([circuit, name, threshold], i) => ({
        pin: String(i + 1),
        name,
        circuit,
        ...threshold,
      })),
    })),
  fc.constant({ kind: 'dlc' }),
]

/** A port of each kind that a wire can land on. */
const portOf: Record<string, string> = {
  battery: 'pos',
  feed: 'out',
  ground: 'in',
  fuse: 'in',
  switch: '1',
  relay: '87a',
  load: 'a',
  resistor: 'b',
  diode: 'anode',
  splice: 's',
  cavity: 'b',
  module: '1',
  dlc: '16',
}

const connector = (id: string) =>
  fc
    .tuple(
      label,
      fc.option(fc.integer({ min: 900, max: 999 }), { nil: null }),
      fc.integer({ min: 1, max: 20 }),
      fc.constantFrom('rows', 'snake', 'columns'),
      fc.record({ a: label, b: label }),
      text(4000),
      amount(0, 10_000),
    )
    .map(([name, cavities, rows, numbering, sides, location, accessMinutes]) => ({
      id,
      label: name,
      cavities,
      rows,
      numbering,
      sides,
      location,
      accessMinutes,
    }))

/** `connectors` of the circuits of one vehicle are the same; each example here has a vehicle of its own. */
export const arbitraryCircuit = fc
  .tuple(
    fc.record({
      title: label.filter((s) => s.length > 0),
      vehicle: label,
      system: label,
      operation: text(4000),
      cautions: fc.subarray([...cautions]),
    }),
    fc.uniqueArray(fc.stringMatching(/^[A-Za-z0-9_-]{1,40}$/), { minLength: 2, maxLength: 12 }),
    fc.array(
      fc.tuple(
        fc.oneof(...particulars),
        label,
        fc.integer({ min: -100_000, max: 100_000 }),
        optional('accessMinutes', amount(0, 10_000)),
        text(4000),
      ),
      { minLength: 12, maxLength: 12 },
    ),
    fc.tuple(connector('con-Z'), connector('con-a')),
    fc.array(
      fc.tuple(
        fc.nat(),
        fc.nat(),
        fc.constantFrom('BU/WH', 'GNYE', 'rd', '', 'pale rose'),
        label,
        amount(0.01, 100),
        fc.option(positive, { nil: null }),
        fc.array(fc.record({ x: amount(-1e5, 1e5), y: amount(-1e5, 1e5) }), { maxLength: 3 }),
      ),
      { maxLength: 12 },
    ),
    fc.array(
      fc.tuple(
        fc.constantFrom('B1042', 'P0A0F', 'U3FFF'),
        optional('failureType', fc.constantFrom('13', '0F')),
        text(4000),
      ),
      { maxLength: 3 },
    ),
    fc.array(fc.tuple(setting, text(4000)), { maxLength: 3 }),
  )
  .map(([head, ids, parts, connectors, wires, codes, steps]) => {
    const nodes = ids.map((id, i): { id: string; kind?: unknown; [field: string]: unknown } => {
      const [particular, name, place, access, notes] = parts[i] as (typeof parts)[number]
      const common = { id: `n${id.slice(0, 38)}`, label: name, x: place, y: 0 - place, notes, ...access }
      // Every third part sits in a connector, every fourth is a cavity of one.
      if (i % 4 === 3) return { ...common, kind: 'cavity', connector: 'con-Z', number: i + 1 }
      const port = portOf[String(particular.kind)] ?? ''
      return i % 3 === 2 &&
        !['splice', 'ground', 'battery', 'feed', 'dlc', 'module'].includes(String(particular.kind))
        ? { ...common, ...particular, connector: 'con-a', cavities: { [port]: i + 1 } }
        : { ...common, ...particular }
    })
    const ends = nodes.map((node) => `${node.id}.${portOf[String(node.kind)]}`)
    return {
      format: 'halfsplit-circuit',
      version: 1,
      ...head,
      controls,
      connectors,
      codes: codes.map(([code, failureType, words]) => ({ code, ...failureType, text: words })),
      sequence: steps.map(([set, words], i) => ({ id: `s${i}`, controls: set, text: words })),
      nodes,
      wires: wires.map(([from, step, colour, signal, mm2, ohms, bends], i) => {
        const start = from % ends.length
        return {
          id: `w-${wires.length - i}`,
          from: ends[start],
          to: ends[(start + 1 + (step % (ends.length - 1))) % ends.length],
          colour,
          signal,
          mm2,
          ohms,
          bends,
        }
      }),
      annotations: steps.map(([set, words], i) => ({
        id: `a${i}`,
        kind: 'expect',
        text: words,
        controls: set,
        x: i,
      })),
    }
  })
