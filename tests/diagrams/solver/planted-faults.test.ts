import { describe, expect, it } from 'vitest'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { inCondition, madeCircuit, onOff, operate, whenOn } from '@/tests/support/made-circuit'

const on = { controls: { key: 'on' } }

/** A main fuse over two fused branches: a relay with its lamp, and a heater; the relay's coil from a module. */
const circuit = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'f1', kind: 'fuse', amps: 40 },
    { id: 's', kind: 'splice' },
    { id: 'f2', kind: 'fuse', amps: 5 },
    { id: 'f3', kind: 'fuse', amps: 20 },
    { id: 'k', kind: 'relay' },
    { id: 'lamp', kind: 'load', ohms: 6 },
    { id: 'heat', kind: 'load', ohms: 3 },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }] },
    {
      id: 'm',
      kind: 'module',
      pins: [
        { pin: '1', circuit: { type: 'supply', ohms: 200 } },
        { pin: '2', circuit: { type: 'ground' } },
        { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
        { pin: '4', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
      ],
    },
    { id: 'p', kind: 'splice' },
    { id: 'g', kind: 'ground' },
  ],
  [
    'bat.pos > f1.in', // w1
    'f1.out > s.s', // w2
    's.s > f2.in', // w3
    's.s > f3.in', // w4
    'f2.out > m.1', // w5
    'f2.out > k.86', // w6
    'k.85 > m.3', // w7
    'm.2 > g.in', // w8
    'f3.out > k.30', // w9
    'k.87 > lamp.a', // w10
    'lamp.b > g.in', // w11
    'f3.out > sw.in', // w12
    'sw.out > heat.a', // w13
    'heat.b > g.in', // w14
    'm.4 > p.s', // w15
  ],
  { controls: [onOff('key')] },
)
const faulty = (fault: PlantedFault, change = {}) => operate(circuit, change, fault)
const works = (fault: PlantedFault, load: string, change: object = on) =>
  faulty(fault, change).loads.get(load)?.works

describe('the good circuit', () => {
  it('lights the lamp and heats with the key on, and neither without', () => {
    expect([...operate(circuit, on).loads.values()].map((load) => load.works)).toEqual([true, true])
    expect([...operate(circuit).loads.values()].map((load) => load.works)).toEqual([false, false])
  })
})

describe('a short to ground', () => {
  it('blows the fuse above it, the most overloaded first, and spares the main one', () => {
    // 0.05 ohm behind 5 A, 40 A and the battery's 0.02 ohm: over 100 A, 20 times the small rating.
    const point = faulty({ site: 'wire:w5', mode: 'short-to-ground', ohms: 0.05 })
    expect(point.blown).toEqual(['f2'])
    expect(point.volts.get('f2.out')).toBeCloseTo(0, 6)
    expect(point.volts.get('f2.in')).toBeCloseTo(12.6, 1)
  })
  it('of 10 ohm stays under 1.35 times a 5 A fuse with its own load and blows nothing', () => {
    expect(faulty({ site: 'wire:w5', mode: 'short-to-ground', ohms: 10 }).blown).toEqual([])
  })
  it('before every branch fuse blows the main one', () => {
    expect(faulty({ site: 'wire:w2', mode: 'short-to-ground', ohms: 0.05 }).blown).toEqual(['f1'])
  })
  it('that only a control uncovers has blown its fuse in every later reading', () => {
    // Behind the switch: with the key off nothing flows now, but the key has been on before.
    expect(faulty({ site: 'wire:w13', mode: 'short-to-ground', ohms: 0.05 }).blown).toEqual(['f3'])
    expect(works({ site: 'wire:w13', mode: 'short-to-ground', ohms: 0.05 }, 'lamp')).toBe(false)
  })
  it('before any fuse takes the volts down and blows none', () => {
    const point = faulty({ site: 'wire:w1', mode: 'short-to-ground', ohms: 0.05 })
    expect(point.blown).toEqual([])
    expect(point.volts.get('bat.pos')).toBeCloseTo((12.6 * 0.0505) / (0.0505 + 0.02), 1)
  })
})

describe('other shorts', () => {
  it('to supply on the driver side keeps the relay released and the lamp dark', () => {
    expect(faulty({ site: 'wire:w7', mode: 'short-to-supply', ohms: 0.05 }, on).relays.get('k')).toBe(false)
  })
  it('to the wire beside it joins the middles of both', () => {
    const point = faulty({ site: 'wire:w15', mode: 'short-to-wire', ohms: 1, other: 'w7' })
    // Key off: the driver is open, so the coil lifts the 5 V line to battery volts.
    expect(point.volts.get('m.4')).toBeGreaterThan(11)
    expect(point.sees.get('m.4')).toBe('high')
  })
  it('in a part lies in parallel with it, and a shorted load never works', () => {
    const point = faulty({ site: 'part:heat', mode: 'shorted', ohms: 3 }, on)
    expect(point.loads.get('heat')).toMatchObject({ works: false })
    expect(point.loads.get('heat')!.volts).toBeGreaterThan(12)
    // 3 ohm beside 3 ohm: twice the amperes, near enough.
    expect(point.wireAmps.get('w13')! / operate(circuit, on).wireAmps.get('w13')!).toBeCloseTo(2, 1)
  })
  it('in a coil never lets it pull in', () => {
    expect(faulty({ site: 'part:k.coil', mode: 'shorted', ohms: 10 }, on).relays.get('k')).toBe(false)
  })
})

describe('opens', () => {
  it.each<[string, PlantedFault]>([
    ['a wire', { site: 'wire:w10', mode: 'open' }],
    ['a contact of the relay', { site: 'part:k.contact', mode: 'stuck-open' }],
    ['a coil', { site: 'part:k.coil', mode: 'open' }],
    ['a blown fuse', { site: 'part:f3', mode: 'blown' }],
    ['a splice at one wire', { site: 'part:s', mode: 'open', wire: 'w3' }],
    ['a splice at its first wire', { site: 'part:s', mode: 'open' }],
    ['a pin', { site: 'pin:m.3', mode: 'open' }],
    ['a supply pin', { site: 'pin:m.1', mode: 'open' }],
    ['the ground', { site: 'part:g', mode: 'open' }],
    ['the lamp', { site: 'part:lamp', mode: 'open' }],
    ['a dead pin', { site: 'pin:m.3', mode: 'dead' }],
    ['a dead module', { site: 'module:m', mode: 'dead' }],
    ['an open battery', { site: 'part:bat', mode: 'open' }],
  ])('%s puts the lamp out', (_, fault) => {
    expect(works(fault, 'lamp')).toBe(false)
  })
  it('a splice at one of its wires leaves the others', () => {
    expect(works({ site: 'part:s', mode: 'open', wire: 'w3' }, 'heat')).toBe(true)
    expect(works({ site: 'part:s', mode: 'open', wire: 'w2' }, 'heat')).toBe(false)
  })
  it('a switch contact stuck open keeps the heater cold', () => {
    expect(works({ site: 'part:sw.x', mode: 'stuck-open' }, 'heat')).toBe(false)
    expect(works({ site: 'part:sw.x', mode: 'stuck-open' }, 'lamp')).toBe(true)
  })
  it('a dead pin takes its pull-up away, a dead module its source but not its ohms', () => {
    expect(faulty({ site: 'pin:m.4', mode: 'dead' }).volts.get('m.4')).toBeCloseTo(0, 6)
    const asleep = faulty({ site: 'module:m', mode: 'dead' })
    expect(asleep.modules.get('m')).toBe(false)
    expect(asleep.volts.get('m.4')).toBeCloseTo(0, 2)
    // Its supply pin still draws its 200 ohm.
    expect(asleep.wireAmps.get('w5')).toBeCloseTo(operate(circuit).wireAmps.get('w5')!, 3)
  })
})

describe('what is stuck on', () => {
  it('a switch contact heats with the key off, a relay contact lights', () => {
    expect(works({ site: 'part:sw.x', mode: 'stuck-closed' }, 'heat', {})).toBe(true)
    expect(works({ site: 'part:k.contact', mode: 'stuck-closed' }, 'lamp', {})).toBe(true)
    expect(faulty({ site: 'part:k.contact', mode: 'stuck-closed' }).relays.get('k')).toBe(false)
  })
  it('a driver pulls the relay in with the key off', () => {
    expect(works({ site: 'pin:m.3', mode: 'stuck-on' }, 'lamp', {})).toBe(true)
  })
  it('a driver conducts in a sleeping module too', () => {
    const coilFromBattery = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        {
          id: 'm',
          kind: 'module',
          pins: [
            { pin: '1', circuit: { type: 'supply', ohms: 200 } },
            { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
          ],
        },
        { id: 'k', kind: 'relay' },
        { id: 's', kind: 'splice' },
      ],
      ['bat.pos > k.86', 'k.85 > m.3', 's.s > m.1'],
      { controls: [onOff('key')] },
    )
    expect(operate(coilFromBattery, on).relays.get('k')).toBe(false)
    const stuck = operate(coilFromBattery, {}, { site: 'pin:m.3', mode: 'stuck-on' })
    expect(stuck.modules.get('m')).toBe(false)
    expect(stuck.relays.get('k')).toBe(true)
  })
})

describe('a weak battery and bad joints', () => {
  it('stands at its own volts', () => {
    expect(faulty({ site: 'part:bat', mode: 'weak', volts: 9 }).volts.get('bat.pos')).toBeCloseTo(9, 1)
  })
  it('of 7 V lets the relay go', () => {
    expect(faulty({ site: 'part:bat', mode: 'weak', volts: 7 }, on).relays.get('k')).toBe(false)
  })
  it('a bad ground shared by all lifts it', () => {
    const point = faulty({ site: 'part:g', mode: 'resistive', ohms: 2 }, on)
    expect(point.volts.get('g.in')).toBeGreaterThan(5)
    expect(point.loads.get('heat')?.works).toBe(false)
  })
  it('resistance inside a load counts against its own element', () => {
    const point = faulty({ site: 'part:heat', mode: 'resistive', ohms: 3 }, on)
    const across = point.volts.get('heat.a')! - point.volts.get('heat.b')!
    expect(point.loads.get('heat')!.volts).toBeCloseTo(across / 2, 9)
    expect(point.loads.get('heat')!.works).toBe(false)
  })
  it('resistance in a splice drops its volts before one wire only', () => {
    const point = faulty({ site: 'part:s', mode: 'resistive', ohms: 1, wire: 'w4' }, on)
    expect(point.volts.get('f3.in')).toBeLessThan(9)
    expect(point.volts.get('f2.in')).toBeGreaterThan(12)
  })
})

describe('a fault that the circuit cannot have is refused', () => {
  it.each<[PlantedFault, string, RegExp]>([
    [{ site: 'wire:w99', mode: 'open' }, 'fault.site', /"wire:w99" does not exist/],
    [{ site: 'part:f1', mode: 'shorted' }, 'fault.mode', /cannot be shorted, expected blown, resistive/],
    [{ site: 'wire:w15', mode: 'short-to-wire', other: 'w1' }, 'fault.other', /"w1" does not lie beside/],
    [{ site: 'part:s', mode: 'open', wire: 'w9' }, 'fault.wire', /"w9" does not end at splice/],
    [{ site: 'wire:w2', mode: 'short-to-ground', ohms: 0 }, 'fault.ohms', /0 ohm, expected more than 0/],
    [{ site: 'wire:w2', mode: 'resistive', ohms: -1 }, 'fault.ohms', /-1 ohm, expected 0 or more/],
    [{ site: 'part:bat', mode: 'weak', volts: -1 }, 'fault.volts', /-1 V, expected 0 or more/],
  ])('%j', (fault, path, message) => {
    const solved = solveOperatingPoint(circuit, inCondition(), fault)
    expect(solved.ok).toBe(false)
    if (!solved.ok) expect(solved.problem).toEqual({ path, message: expect.stringMatching(message) })
  })
})
