import { describe, expect, it } from 'vitest'
import type { Probe } from '@/diagrams/document/reading-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { inCondition, madeCircuit, onOff, operate, whenOn } from '@/tests/support/made-circuit'

/** Battery, fuse, switch, a lamp behind a plug, ground. */
const lampLine = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'f', kind: 'fuse', amps: 10 },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }] },
    { id: 'lamp', kind: 'load', ohms: 6, coldOhms: 0.6, connector: 'c1', cavities: { a: 1, b: 2 } },
    { id: 'g', kind: 'ground' },
  ],
  ['bat.pos > f.in', 'f.out > sw.in', 'sw.out > lamp.a', 'lamp.b > g.in'],
  { controls: [onOff('key')], connectors: [{ id: 'c1', label: 'C1', cavities: 2 }] },
)
const on = { controls: { key: 'on' } }
const dead = { battery: false }

function read(
  circuit: Circuit,
  probe: Omit<Extract<Probe, { red: string }>, 'condition'>,
  change: Partial<Condition> = {},
  fault?: PlantedFault,
) {
  const found = measure(circuit, { ...probe, condition: inCondition(change) }, fault)
  if (!found.ok) throw new Error(found.problem.message)
  return found.value
}
const volts = (red: string, black = 'chassis') => ({ kind: 'volts' as const, red, black })
const ohms = (red: string, black = 'chassis') => ({ kind: 'ohms' as const, red, black })

describe('a voltmeter of 10 Mohm', () => {
  it('shows next to nothing on a wire that hangs free, and full volts through an open of a few ohms only', () => {
    expect(read(lampLine, volts('lamp.a'))).toBeCloseTo(0, 6)
    expect(read(lampLine, volts('lamp.a'), { ...on, unplugged: ['c1'] })).toBeCloseTo(12.6, 4)
    const dirty: PlantedFault = { site: 'wire:w3', mode: 'resistive', ohms: 100 }
    expect(read(lampLine, volts('lamp.a'), { ...on, unplugged: ['c1'] }, dirty)).toBeCloseTo(12.6, 3)
  })

  it('halves the volts behind 10 Mohm, and an open of 1 Gohm leaves it a ghost of a hundredth', () => {
    const behind = (resistance: number): PlantedFault => ({ site: 'wire:w3', mode: 'open', ohms: resistance })
    const unplugged = { ...on, unplugged: ['c1'] }
    expect(read(lampLine, volts('lamp.a'), unplugged, { ...behind(1e7) })).toBeCloseTo(6.3, 2)
    expect(read(lampLine, volts('lamp.a'), unplugged, behind(1e9))).toBeCloseTo(12.6 / 101, 3)
    // Unloaded the same point stands at nearly full volts.
    expect(operate(lampLine, unplugged, behind(1e9)).volts.get('lamp.a')).toBeGreaterThan(12)
  })

  it('shows a drop across a part, and its sign', () => {
    const drop = read(lampLine, volts('lamp.a', 'lamp.b'), on) as number
    expect(drop).toBeCloseTo((12.6 * (6 + 0.01)) / 6.064, 2)
    expect(read(lampLine, volts('lamp.b', 'lamp.a'), on)).toBeCloseTo(-drop, 12)
  })
})

describe('an ohmmeter', () => {
  it('reads a cold filament with the battery off, its plug in and out', () => {
    expect(read(lampLine, ohms('lamp.a', 'lamp.b'), dead)).toBeCloseTo(0.61, 6)
    expect(read(lampLine, ohms('lamp.a:part', 'lamp.b:part'), { ...dead, unplugged: ['c1'] })).toBeCloseTo(
      0.6,
      6,
    )
    expect(read(lampLine, ohms('lamp.a', 'lamp.b'), { ...dead, unplugged: ['c1'] })).toBe('OL')
  })

  it('shows OL above 40 Mohm and a figure below', () => {
    const across = (resistance: number) =>
      read(
        madeCircuit(
          [
            { id: 'r', kind: 'resistor', ohms: resistance },
            { id: 's', kind: 'splice' },
            { id: 't', kind: 'splice' },
          ],
          ['s.s > r.a', 'r.b > t.s'],
        ),
        ohms('s.s', 't.s'),
        dead,
      )
    expect(across(39e6)).toBeCloseTo(39e6, -5)
    expect(across(41e6)).toBe('OL')
  })

  it('sees OL across a diode either way, because it cannot drive one', () => {
    const circuit = madeCircuit(
      [
        { id: 'd', kind: 'diode' },
        { id: 's', kind: 'splice' },
        { id: 'bat', kind: 'battery' },
      ],
      ['s.s > d.anode'],
    )
    expect(read(circuit, ohms('d.anode', 'd.cathode'), dead)).toBe('OL')
    expect(read(circuit, ohms('d.cathode', 'd.anode'), dead)).toBe('OL')
  })

  it('sees OL from each point to every other in a harness of a hundred loose ends, leaks and all', () => {
    const splices = Array.from({ length: 100 }, (_, i) => ({ id: `s${i}`, kind: 'splice' as const }))
    const circuit = madeCircuit(
      [...splices, { id: 'g', kind: 'ground' }],
      Array.from({ length: 98 }, (_, i) => `s${i}.s > s${i + 1}.s`),
    )
    expect(read(circuit, ohms('s0.s'), dead)).toBe('OL')
    expect(read(circuit, ohms('s0.s', 's99.s'), dead)).toBe('OL')
    expect(read(circuit, ohms('s0.s', 's98.s'), dead)).toBeCloseTo(0.098, 9)
  })

  it('is refused on a live circuit with the caution that says why', () => {
    const live = (change: Partial<Condition>, red: string, black: string) =>
      refuseReading(lampLine, { ...ohms(red, black), condition: inCondition(change) })
    expect(live(on, 'lamp.a', 'lamp.b')).toEqual({
      path: 'condition.battery',
      message: expect.stringMatching(/battery disconnected.*harm the meter/),
    })
    // Fuse out: 12.6 V stand at its feed side still, but nothing feeds the lamp.
    expect(live({ ...on, unplugged: ['f'] }, 'f.in', 'chassis')?.path).toBe('condition.battery')
    expect(live({ ...on, unplugged: ['f'] }, 'lamp.a', 'lamp.b')).toBeNull()
    expect(live({ ...on, ...dead }, 'f.in', 'chassis')).toBeNull()
  })

  it('is refused where a source is connected although it stands at 0 V', () => {
    // A bridge of two equal feeds: no volts over the lamp's ground side, but both ends are fed.
    const circuit = madeCircuit(
      [
        { id: 'm', kind: 'module', pins: [{ pin: '1', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } }] },
        { id: 'bat', kind: 'battery' },
        { id: 'g', kind: 'ground' },
      ],
      ['m.1 > g.in'],
    )
    expect(operate(circuit).volts.get('m.1')).toBeLessThan(0.05)
    expect(refuseReading(circuit, { ...ohms('m.1'), condition: inCondition() })?.path).toBe(
      'condition.battery',
    )
    expect(refuseReading(circuit, { ...ohms('m.1'), condition: inCondition(dead) })).toBeNull()
  })
})

describe('a reading is refused', () => {
  const refuse = (probe: Probe) => refuseReading(lampLine, probe)
  const condition = inCondition()
  it.each<[string, Probe, string, RegExp]>([
    ['on a point that does not exist', { ...volts('lamp.c'), condition }, 'red', /lamp\.c does not exist/],
    [
      'on the part side of a part without a plug',
      { ...volts('f.in:part'), condition },
      'red',
      /does not exist/,
    ],
    [
      'on the part side while its plug is in',
      { ...volts('lamp.a:part'), condition },
      'red',
      /only while its connector is unplugged/,
    ],
    ['with both leads on one point', { ...volts('f.in', 'f.in'), condition }, 'black', /both leads/],
    ['on a wire that does not exist', { kind: 'amps', wire: 'w9', condition }, 'wire', /w9/],
    ['on a load that does not exist', { kind: 'works', node: 'f', condition }, 'node', /load "f"/],
    ['on an input that is none', { kind: 'sees', pin: 'f.in', condition }, 'pin', /not an input/],
    [
      'with an unknown control',
      { ...volts('f.in'), condition: inCondition({ controls: { x: 'on' } }) },
      'condition.controls.x',
      /does not exist/,
    ],
    [
      'with an unknown position',
      { ...volts('f.in'), condition: inCondition({ controls: { key: 'up' } }) },
      'condition.controls.key',
      /no position "up"/,
    ],
    [
      'with something unplugged that has no plug',
      { ...volts('f.in'), condition: inCondition({ unplugged: ['lamp'] }) },
      'condition.unplugged.0',
      /not a connector, fuse or relay/,
    ],
    [
      'with a lead added to nowhere',
      { ...volts('f.in'), condition: inCondition({ added: [{ from: 'f.in', to: 'q.1', ohms: 1 }] }) },
      'condition.added.0.to',
      /q\.1/,
    ],
  ])('%s', (_, probe, path, message) => {
    expect(refuse(probe)).toEqual({ path, message: expect.stringMatching(message) })
  })

  it('and taken on the part side once unplugged, or once its fuse is pulled', () => {
    expect(refuse({ ...volts('lamp.a:part'), condition: inCondition({ unplugged: ['c1'] }) })).toBeNull()
  })
})

describe('what is put in or pulled out', () => {
  it('a pulled fuse opens its circuit, a pulled relay its coil and contacts', () => {
    expect(operate(lampLine, { ...on, unplugged: ['f'] }).wireAmps.get('w4')).toBeCloseTo(0, 6)
    const relay = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'g', kind: 'ground' },
        { id: 'k', kind: 'relay', suppression: 'resistor' },
        { id: 'lamp', kind: 'load', ohms: 10 },
      ],
      ['bat.pos > k.86', 'k.85 > g.in', 'bat.pos > k.30', 'k.87 > lamp.a', 'lamp.b > g.in'],
    )
    expect(operate(relay).loads.get('lamp')?.works).toBe(true)
    const pulled = operate(relay, { unplugged: ['k'] })
    expect(pulled.loads.get('lamp')?.works).toBe(false)
    expect(pulled.wireAmps.get('w1')).toBeCloseTo(0, 6)
    expect(read(relay, ohms('k.86', 'k.85'), { ...dead, unplugged: ['k'] })).toBe('OL')
    // A fused lead from 30 to 87 does the contact's work.
    const led = operate(relay, { unplugged: ['k'], added: [{ from: 'k.30', to: 'k.87', ohms: 0.05 }] })
    expect(led.loads.get('lamp')?.works).toBe(true)
  })

  it('a test lamp of 48 ohm pulls a line down that a voltmeter finds good', () => {
    const corroded: PlantedFault = { site: 'wire:w3', mode: 'resistive', ohms: 200 }
    const free = { ...on, unplugged: ['c1'] }
    expect(read(lampLine, volts('lamp.a'), free, corroded)).toBeCloseTo(12.6, 3)
    const loaded = { ...free, added: [{ from: 'lamp.a', to: 'chassis', ohms: 48 }] }
    expect(read(lampLine, volts('lamp.a'), loaded, corroded)).toBeCloseTo((12.6 * 48) / 248, 2)
  })

  it('amperes count positive from the wire’s from to its to', () => {
    const amps = (wire: string) => measure(lampLine, { kind: 'amps', wire, condition: inCondition(on) })
    const [first, last] = [amps('w1'), amps('w4')]
    if (!first.ok || !last.ok) throw new Error()
    expect(first.value).toBeCloseTo(12.6 / (6 + 0.02 + 0.008 + 0.02 + 0.01 + 0.004 + 0.002), 6)
    expect(last.value).toBeCloseTo(Number(first.value), 6)
  })
})
