import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import type { NodeInput } from '@/tests/support/harness-draft'
import { inCondition, madeCircuit, onOff, operate, whenOn } from '@/tests/support/made-circuit'

const battery: NodeInput = { id: 'bat', kind: 'battery' }
const ground: NodeInput = { id: 'g', kind: 'ground' }
const switchOn = (id: string, control = id): NodeInput => ({
  id,
  kind: 'switch',
  contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn(control) }],
})
const on = { controls: { key: 'on' } }

describe('a relay', () => {
  const withResistor = (ohms: number): Circuit =>
    madeCircuit(
      [
        battery,
        ground,
        switchOn('key'),
        { id: 'r', kind: 'resistor', ohms },
        { id: 'k', kind: 'relay' },
        { id: 'made', kind: 'load', ohms: 10 },
        { id: 'broken', kind: 'load', ohms: 10 },
      ],
      [
        'bat.pos > key.in',
        'key.out > r.a',
        'r.b > k.86',
        'k.85 > g.in',
        'bat.pos > k.30',
        'k.87 > made.a',
        'made.b > g.in',
        'k.87a > broken.a',
        'broken.b > g.in',
      ],
      { controls: [onOff('key')] },
    )
  const works = (circuit: Circuit) => [...operate(circuit, on).loads.values()].map((load) => load.works)

  it('rests on 87a and pulls in to 87 when its coil is fed', () => {
    const circuit = withResistor(0.01)
    const rest = operate(circuit)
    expect(rest.relays.get('k')).toBe(false)
    expect([rest.loads.get('made')?.works, rest.loads.get('broken')?.works]).toEqual([false, true])
    expect(works(circuit)).toEqual([true, false])
  })

  it('pulls in at 7.5 V over its own coil of 85 ohm and not below', () => {
    // 12.55 V × 85/(85 + r): 7.6 V at 55.4 ohm, 7.4 V at 59.2 ohm.
    expect(works(withResistor(55))).toEqual([true, false])
    expect(works(withResistor(60))).toEqual([false, true])
  })

  it('that holds itself stays released, because a circuit settles from everything released', () => {
    const circuit = madeCircuit(
      [battery, ground, { id: 'k', kind: 'relay' }, switchOn('start')],
      ['bat.pos > k.30', 'k.87 > k.86', 'k.85 > g.in', 'bat.pos > start.in', 'start.out > k.86'],
      { controls: [onOff('start')] },
    )
    expect(operate(circuit).relays.get('k')).toBe(false)
    expect(operate(circuit).volts.get('k.86')).toBeCloseTo(0, 6)
    expect(operate(circuit, { controls: { start: 'on' } }).relays.get('k')).toBe(true)
    // The same with a lead in place of the button.
    const lead = [{ from: 'bat.pos', to: 'k.86', ohms: 0.05 }]
    expect(operate(circuit, { added: lead }).relays.get('k')).toBe(true)
  })

  it('that breaks its own coil feed is refused as unstable', () => {
    const circuit = madeCircuit(
      [battery, ground, { id: 'k', kind: 'relay' }],
      ['bat.pos > k.30', 'k.87a > k.86', 'k.85 > g.in'],
    )
    const solved = solveOperatingPoint(circuit, inCondition())
    expect(solved.ok).toBe(false)
    if (!solved.ok) expect(solved.problem.message).toMatch(/does not come to rest/)
    expect(operate(circuit, { battery: false }).relays.get('k')).toBe(false)
  })

  it('pulls in the relay after it', () => {
    const circuit = madeCircuit(
      [battery, ground, switchOn('key'), { id: 'k1', kind: 'relay' }, { id: 'k2', kind: 'relay' }],
      [
        'bat.pos > key.in',
        'key.out > k1.86',
        'k1.85 > g.in',
        'bat.pos > k1.30',
        'k1.87 > k2.86',
        'k2.85 > g.in',
      ],
      { controls: [onOff('key')] },
    )
    expect([...operate(circuit, on).relays.values()]).toEqual([true, true])
    expect([...operate(circuit).relays.values()]).toEqual([false, false])
  })

  it('with a suppression diode carries nothing in it one way round, and shorts its feed through it the other', () => {
    const coil = (plus: string, minus: string) =>
      operate(
        madeCircuit(
          [battery, ground, { id: 'k', kind: 'relay', suppression: 'diode' }],
          [`bat.pos > k.${plus}`, `k.${minus} > g.in`],
        ),
      )
    const right = coil('86', '85')
    expect(right.wireAmps.get('w1')).toBeCloseTo(12.6 / (85 + 0.02 + 0.002 + 0.002), 6)
    expect(right.relays.get('k')).toBe(true)
    // Reversed: 12.6 V less the diode's 0.7 V over battery, wires, ground and the diode's 0.01 ohm.
    const wrong = coil('85', '86')
    expect(wrong.wireAmps.get('w1')).toBeCloseTo((12.6 - 0.7) / 0.034, -1)
    expect(wrong.relays.get('k')).toBe(false)
  })

  it('with a suppression resistor draws through it as well', () => {
    const circuit = madeCircuit(
      [battery, ground, { id: 'k', kind: 'relay', suppression: 'resistor' }],
      ['bat.pos > k.86', 'k.85 > g.in'],
    )
    const ohms = 1 / (1 / 85 + 1 / 680)
    expect(operate(circuit).wireAmps.get('w1')).toBeCloseTo(12.6 / (ohms + 0.024), 6)
  })
})

describe('a diode', () => {
  const circuit = (from: string, to: string) =>
    madeCircuit(
      [battery, ground, { id: 'd', kind: 'diode' }, { id: 'lamp', kind: 'load', ohms: 12 }],
      [`bat.pos > d.${from}`, `d.${to} > lamp.a`, 'lamp.b > g.in'],
    )
  it('drops its volts forwards and blocks backwards', () => {
    const forwards = operate(circuit('anode', 'cathode'))
    expect(forwards.wireAmps.get('w1')).toBeCloseTo((12.6 - 0.7) / (12 + 0.01 + 0.02 + 0.003 + 0.002), 6)
    expect(operate(circuit('cathode', 'anode')).wireAmps.get('w1')).toBeCloseTo(0, 6)
  })
  it('lets the higher of two feeds through and keeps it from the lower', () => {
    const two = madeCircuit(
      [
        { id: 'high', kind: 'feed', volts: 14 },
        { id: 'low', kind: 'feed', volts: 12 },
        { id: 'd1', kind: 'diode' },
        { id: 'd2', kind: 'diode' },
        { id: 's', kind: 'splice' },
        { id: 'lamp', kind: 'load', ohms: 12 },
        ground,
      ],
      [
        'high.out > d1.anode',
        'low.out > d2.anode',
        'd1.cathode > s.s',
        'd2.cathode > s.s',
        's.s > lamp.a',
        'lamp.b > g.in',
      ],
    )
    const point = operate(two)
    expect(point.wireAmps.get('w2')).toBeCloseTo(0, 6)
    expect(point.volts.get('low.out')).toBeCloseTo(12, 6)
    // 14 V less 0.7 V, divided by feed 0.05, diode 0.01 and wires and ground 0.005 under 12 ohm.
    expect(point.wireAmps.get('w5')).toBeCloseTo(13.3 / (12 + 0.05 + 0.01 + 0.004 + 0.002), 6)
  })
})

describe('a module', () => {
  const circuit = madeCircuit(
    [
      battery,
      ground,
      { id: 'f', kind: 'fuse', amps: 10 },
      {
        id: 'm',
        kind: 'module',
        pins: [
          { pin: '1', circuit: { type: 'supply', ohms: 200 } },
          { pin: '2', circuit: { type: 'ground' } },
          { pin: '3', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
          { pin: '4', circuit: { type: 'high-side' } },
          { pin: '5', circuit: { type: 'low-side', on: whenOn('key') } },
          { pin: '6', circuit: { type: 'source', volts: 5, ohms: 1 } },
        ],
      },
      { id: 'lamp', kind: 'load', ohms: 20 },
      { id: 'horn', kind: 'load', ohms: 20 },
      { id: 's3', kind: 'splice' },
      { id: 's6', kind: 'splice' },
    ],
    [
      'bat.pos > f.in',
      'f.out > m.1',
      'm.2 > g.in',
      'm.3 > s3.s',
      'm.4 > lamp.a',
      'lamp.b > g.in',
      'bat.pos > horn.a',
      'horn.b > m.5',
      'm.6 > s6.s',
    ],
    { controls: [onOff('key')] },
  )

  it('awake pulls up, feeds, and switches to ground when told', () => {
    const { modules, volts, loads } = operate(circuit)
    expect(modules.get('m')).toBe(true)
    expect(volts.get('m.3')).toBeCloseTo(5, 2)
    expect(volts.get('m.6')).toBeCloseTo(5, 2)
    expect(loads.get('lamp')?.works).toBe(true)
    expect(loads.get('horn')?.works).toBe(false)
    expect(operate(circuit, on).loads.get('horn')?.works).toBe(true)
  })

  it('without its supply sleeps: sources stand at 0 V, drivers are open, inputs see low', () => {
    const asleep = operate(circuit, { ...on, unplugged: ['f'] })
    expect(asleep.modules.get('m')).toBe(false)
    for (const point of ['m.3', 'm.4', 'm.6']) expect(asleep.volts.get(point)).toBeCloseTo(0, 6)
    expect(asleep.loads.get('horn')?.works).toBe(false)
    expect(asleep.sees.get('m.3')).toBe('low')
    expect(operate(circuit).sees.get('m.3')).toBe('high')
  })

  it('sleeps below the volts it runs from: 6 V over its own ground', () => {
    const behind = (ohms: number) =>
      operate(circuit, {}, { site: 'wire:w2', mode: 'resistive', ohms }).modules.get('m')
    // Its 200 ohm and, until it wakes, nothing else: 6 V stand over it behind 220 ohm. Once awake the
    // lamp's 20 ohm hangs on the same pin, and behind anything that counts it falls asleep again.
    expect(behind(0.5)).toBe(true)
    expect(behind(230)).toBe(false)
  })

  it('whose own load puts it to sleep is refused as unstable', () => {
    const solved = solveOperatingPoint(circuit, inCondition(), {
      site: 'wire:w2',
      mode: 'resistive',
      ohms: 100,
    })
    expect(solved.ok).toBe(false)
  })

  it('that draws no supply is awake while the battery is connected, its ground being chassis', () => {
    const line = madeCircuit(
      [
        battery,
        {
          id: 'm',
          kind: 'module',
          pins: [{ pin: '1', circuit: { type: 'pull-up', volts: 12, ohms: 1000 } }],
        },
        { id: 's', kind: 'splice' },
      ],
      ['m.1 > s.s'],
    )
    expect(operate(line).volts.get('s.s')).toBeCloseTo(12, 6)
    expect(operate(line).modules.get('m')).toBe(true)
    expect(operate(line, { battery: false }).modules.get('m')).toBe(false)
    expect(operate(line, { battery: false }).volts.get('s.s')).toBe(0)
  })

  it('reports its input against its threshold', () => {
    const line = (threshold?: number) =>
      operate(
        madeCircuit(
          [
            {
              id: 'm',
              kind: 'module',
              pins: [{ pin: '1', threshold, circuit: { type: 'pull-up', volts: 5, ohms: 1000 } }],
            },
            { id: 'r', kind: 'resistor', ohms: 1500 },
            battery,
            ground,
          ],
          ['m.1 > r.a', 'r.b > g.in'],
        ),
      ).sees.get('m.1')
    // 3 V at the pin: above half of 5 V, below a threshold of 3.5 V.
    expect(line()).toBe('high')
    expect(line(3.5)).toBe('low')
  })
})

describe('a supply', () => {
  const circuit = madeCircuit(
    [
      battery,
      ground,
      { id: 'fd', kind: 'feed', live: whenOn('key') },
      { id: 'lamp', kind: 'load', ohms: 6, coldOhms: 0.6 },
      { id: 'tail', kind: 'load', ohms: 6 },
      { id: 'g2', kind: 'ground' },
    ],
    ['bat.pos > lamp.a', 'lamp.b > g.in', 'fd.out > tail.a', 'tail.b > g2.in'],
    { controls: [onOff('key')] },
  )
  it('drawn on another page feeds only while live, and not with the battery off', () => {
    expect(operate(circuit).loads.get('tail')?.works).toBe(false)
    expect(operate(circuit, on).volts.get('fd.out')).toBeCloseTo((12.6 * 6.004) / 6.054, 5)
    expect(operate(circuit, { ...on, battery: false }).volts.get('fd.out')).toBe(0)
  })
  it('stands at 14.15 V while charging, battery and feeds alike', () => {
    const charging = operate(circuit, { ...on, charging: true })
    expect(charging.volts.get('fd.out')! / operate(circuit, on).volts.get('fd.out')!).toBeCloseTo(
      14.15 / 12.6,
      9,
    )
    expect(charging.volts.get('bat.pos')! / operate(circuit, on).volts.get('bat.pos')!).toBeCloseTo(
      14.15 / 12.6,
      9,
    )
  })
  it('24 V drawn scales the same', () => {
    const truck = madeCircuit([{ id: 'bat', kind: 'battery', volts: 25.2 }], [])
    expect(operate(truck, { charging: true }).volts.get('bat.pos')).toBeCloseTo(28.3, 6)
    expect(operate(truck, {}, undefined).volts.get('bat.pos')).toBeCloseTo(25.2, 6)
  })
})

describe('a circuit that does not come to rest', () => {
  const buzzer = madeCircuit(
    [battery, ground, { id: 'k', kind: 'relay' }],
    ['bat.pos > k.30', 'k.87a > k.86', 'k.85 > g.in'],
  )
  const red = { red: 'k.86', black: 'chassis' }

  it('has no figure to read, and a reading taken in it is refused as unstable', () => {
    for (const probe of [
      { kind: 'volts' as const, ...red, condition: inCondition() },
      { kind: 'amps' as const, wire: 'w1', condition: inCondition() },
    ])
      expect(refuseReading(buzzer, probe)?.message).toMatch(/unstable|settle|rest/i)
  })

  it('can be read with the battery off', () => {
    const condition = inCondition({ battery: false })
    expect(refuseReading(buzzer, { kind: 'ohms', ...red, condition })).toBeNull()
  })
})
