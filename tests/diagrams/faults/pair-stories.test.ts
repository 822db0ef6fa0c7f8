import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import type { TwoFaults } from '@/diagrams/solver/two-fault-case'
import { inCondition, madeCircuit, onOff, whenOn } from '../../support/made-circuit'
import { readTwoFaults } from '../../support/trace-two-faults'

const at = { x: 0, y: 0 }

/** A lamp and a heater, each with a fuse, a switch and a ground of its own, on one key. */
const lampAndHeater = madeCircuit(
  [
    { kind: 'battery', id: 'bat', label: 'Battery', ...at },
    { kind: 'splice', id: 's', label: 'S1', ...at },
    { kind: 'fuse', id: 'f1', label: 'F1', ...at, amps: 10 },
    { kind: 'fuse', id: 'f2', label: 'F2', ...at, amps: 20 },
    {
      kind: 'switch',
      id: 'sw',
      label: 'SW1',
      ...at,
      contacts: [{ id: 'c', a: 'in', b: 'out', closed: whenOn('key') }],
    },
    { kind: 'cavity', id: 'x1', label: 'X1', ...at, connector: 'x', number: 1 },
    { kind: 'load', id: 'lamp', label: 'Lamp', ...at, ohms: 6, style: 'lamp' },
    { kind: 'load', id: 'heater', label: 'Heater', ...at, ohms: 1.5, style: 'heater' },
    { kind: 'ground', id: 'g1', label: 'G1', ...at },
    { kind: 'ground', id: 'g2', label: 'G2', ...at },
  ],
  [
    'bat.pos > s.s',
    's.s > f1.in',
    's.s > f2.in',
    'f1.out > sw.in',
    'sw.out > x1.a',
    'x1.b > lamp.a',
    'lamp.b > g1.in',
    'f2.out > heater.a',
    'heater.b > g2.in',
  ],
  { controls: [onOff('key')], connectors: [{ id: 'x', label: 'X', cavities: 2 }] },
)

/** A pump fed through two fuses side by side, so that one of them may be missing unnoticed. */
const pumpOnTwoFuses = madeCircuit(
  [
    { kind: 'battery', id: 'bat', label: 'Battery', ...at },
    { kind: 'splice', id: 's1', label: 'S1', ...at },
    { kind: 'splice', id: 's2', label: 'S2', ...at },
    { kind: 'fuse', id: 'f1', label: 'F1', ...at, amps: 15 },
    { kind: 'fuse', id: 'f2', label: 'F2', ...at, amps: 15 },
    { kind: 'load', id: 'pump', label: 'Pump', ...at, ohms: 2, style: 'motor' },
    { kind: 'ground', id: 'g', label: 'G1', ...at },
  ],
  [
    'bat.pos > s1.s',
    's1.s > f1.in',
    's1.s > f2.in',
    'f1.out > s2.s',
    'f2.out > s2.s',
    's2.s > pump.a',
    'pump.b > g.in',
  ],
)

const on = inCondition({ controls: { key: 'on' } })
const volts = (red: string, condition = on): Probe => ({ kind: 'volts', red, black: 'chassis', condition })

function read(circuit: Circuit, faults: TwoFaults, probes: Probe[]): Reading[] {
  return probes.map((probe, i) => readTwoFaults(`r${i + 1}`, circuit, probe, faults)!)
}

const judge = (circuit: Circuit, readings: Reading[]): Answer =>
  evaluate({ circuit, readings, codes: [], priors: 'trade' })

/** Places of the likeliest pair and all that look like them, the two in the order of the alphabet. */
function named(answer: Answer): string[][] {
  const groupOf = (site: string) => answer.inseparable.find((group) => group.includes(site)) ?? [site]
  return answer.pairs![0]!.sites.map((site) => groupOf(site).toSorted()).toSorted()
}

describe('two faults that no single one explains', () => {
  it('an open ground of the lamp and a blown fuse of the heater are both named', () => {
    const faults: TwoFaults = [
      { site: 'part:g1', mode: 'open', ohms: 1e10 },
      { site: 'part:f2', mode: 'blown', ohms: 1e10 },
    ]
    const readings = read(lampAndHeater, faults, [
      volts('lamp.b'),
      volts('g1.in'),
      { kind: 'works', node: 'lamp', condition: on },
      volts('f2.in'),
      volts('f2.out'),
      { kind: 'works', node: 'heater', condition: on },
    ])
    const answer = judge(lampAndHeater, readings)
    expect(answer.outcome).toBe('two-faults')
    expect(named(answer)).toEqual([['part:f2'], ['part:g1']])
    // A short that has blown F2 by itself is the other story.
    expect(answer.pairs![0]!.probability).toBeGreaterThan(0.7)
    // Their own probabilities, not shares of one.
    for (const site of answer.sites.slice(0, 2)) expect(site.probability).toBeGreaterThan(0.7)
    expect(answer.sites[0]).toMatchObject({ site: 'part:g1', verdict: 'faulty' })
    expect(answer.noFault).toBe(0)
    expect(answer.says).toMatch(/^Two faults\. A: .+\. B: .+\. /)
    expect(answer.says).toContain('F2 has blown')
    expect(answer.says).toContain('Open at G1')
  })

  it('withdraws every clearance, and says which readings speak of which fault', () => {
    const faults: TwoFaults = [
      { site: 'part:g1', mode: 'open', ohms: 1e10 },
      { site: 'part:f2', mode: 'blown', ohms: 1e10 },
    ]
    const readings = read(lampAndHeater, faults, [
      volts('lamp.b'),
      volts('g1.in'),
      volts('f2.in'),
      volts('f2.out'),
      volts('heater.a'),
    ])
    const answer = judge(lampAndHeater, readings)
    expect(answer.outcome).toBe('two-faults')
    expect(
      answer.sites.some((site) => site.verdict === 'proved-good' || site.firm || site.clearedBy.length > 0),
    ).toBe(false)
    const [pair] = answer.pairs!
    const ground = pair!.sites.findIndex((site) => site !== 'part:f2')
    expect(pair!.readings[ground]).toEqual(['r1', 'r2'])
    expect(pair!.readings[1 - ground]).toEqual(['r4', 'r5'])
    expect(answer.says).toMatch(/R1 and R2 speak of [AB]/)
    expect(answer.says).toMatch(/R4 and R5 speak of [AB]/)
  })

  it('a bad joint in one branch keeps its ohms beside an open in the other', () => {
    const faults: TwoFaults = [
      { site: 'contact:x1', mode: 'resistive', ohms: 4 },
      { site: 'part:g2', mode: 'open', ohms: 1e10 },
    ]
    const readings = read(lampAndHeater, faults, [
      volts('x1.a'),
      volts('x1.b'),
      { kind: 'amps', wire: 'w6', condition: on },
      volts('lamp.b'),
      volts('heater.b'),
      volts('g2.in'),
      { kind: 'works', node: 'heater', condition: on },
    ])
    const answer = judge(lampAndHeater, readings)
    expect(answer.outcome).toBe('two-faults')
    expect(named(answer)).toEqual([['contact:x1'], ['part:g2']])
    const joint = answer.pairs![0]!.sites.indexOf('contact:x1')
    expect(answer.pairs![0]!.modes[joint]).toBe('resistive')
    expect(answer.pairs![0]!.ohms[joint]).toBeGreaterThan(3.2)
    expect(answer.pairs![0]!.ohms[joint]).toBeLessThan(5)
  })

  it('two opens in feeds side by side are found, of which neither alone would be noticed', () => {
    const faults: TwoFaults = [
      { site: 'part:f1', mode: 'blown', ohms: 1e10 },
      { site: 'part:f2', mode: 'blown', ohms: 1e10 },
    ]
    const rest = inCondition()
    const readings = read(pumpOnTwoFuses, faults, [
      volts('f1.in', rest),
      volts('f2.in', rest),
      volts('f1.out', rest),
      volts('f2.out', rest),
      { kind: 'ohms', red: 'f1.out', black: 'f2.out', condition: inCondition({ battery: false }) },
      // Without this a short beyond them, which has blown both, would explain all.
      { kind: 'ohms', red: 's2.s', black: 'chassis', condition: inCondition({ battery: false }) },
    ])
    const answer = judge(pumpOnTwoFuses, readings)
    expect(answer.outcome).toBe('two-faults')
    expect(answer.pairs![0]!.sites.toSorted()).toEqual(['part:f1', 'part:f2'])
    expect(answer.pairs![0]!.modes).toEqual(['blown', 'blown'])
  })

  it('a short behind an open has blown nothing, and is still found', () => {
    const faults: TwoFaults = [
      { site: 'part:sw.c', mode: 'stuck-open', ohms: 1e10 },
      { site: 'wire:w6', mode: 'short-to-ground', ohms: 0.05 },
    ]
    const dead = inCondition({ battery: false, unplugged: ['x'] })
    const readings = read(lampAndHeater, faults, [
      volts('f1.out'),
      volts('sw.in'),
      volts('sw.out'),
      {
        kind: 'ohms',
        red: 'sw.in',
        black: 'sw.out',
        condition: inCondition({ battery: false, controls: { key: 'on' } }),
      },
      { kind: 'ohms', red: 'x1.b', black: 'chassis', condition: dead },
      { kind: 'ohms', red: 'x1.a', black: 'chassis', condition: dead },
    ])
    expect(readings[0]!.value).toBeGreaterThan(12)
    const answer = judge(lampAndHeater, readings)
    expect(answer.outcome).toBe('two-faults')
    const modes = new Set(answer.pairs![0]!.modes)
    expect([...modes].some((mode) => mode.startsWith('short'))).toBe(true)
    expect(named(answer).flat()).toContain('wire:w6')
    expect(named(answer).flat()).toContain('part:sw.c')
  })

  it('offers readings that would tell the pairs apart, and gives places by name', () => {
    const faults: TwoFaults = [
      { site: 'part:g1', mode: 'open', ohms: 1e10 },
      { site: 'part:f2', mode: 'blown', ohms: 1e10 },
    ]
    // Where the lamp's way to ground is broken nobody knows yet, nor why the heater has no feed.
    const readings = read(lampAndHeater, faults, [
      volts('lamp.b'),
      { kind: 'works', node: 'lamp', condition: on },
      volts('heater.a'),
      { kind: 'works', node: 'heater', condition: on },
      { kind: 'amps', wire: 'w8', condition: on },
    ])
    const answer = judge(lampAndHeater, readings)
    expect(answer.outcome).toBe('two-faults')
    expect(answer.next.length).toBeGreaterThan(0)
    const known = new Set(answer.sites.map((site) => site.site))
    for (const next of answer.next) {
      expect(next.bits).toBeGreaterThan(0)
      for (const outcome of next.outcomes) for (const place of outcome.leaves) expect(known).toContain(place)
    }
    const sum = answer.sites.reduce((total, site) => total + site.probability, 0)
    expect(sum).toBeCloseTo(2, 6)
    for (const site of answer.sites)
      expect(site.modes.reduce((total, mode) => total + mode.probability, 0)).toBeCloseTo(site.probability, 6)
  })
})

describe('one fault and one slipped reading', () => {
  it('is told from two faults: the slipped reading is named, until it has been taken again', () => {
    const probes = [volts('lamp.b'), volts('g1.in'), volts('f1.out'), volts('heater.a'), volts('x1.a')]
    // Lamp without a ground: battery volts everywhere up to the open; a lead that did not touch at the heater.
    const shown = [12.58, 12.58, 12.59, 0.004, 12.58]
    const slipped = probes.map((probe, i) => ({ id: `r${i + 1}`, ...probe, value: shown[i]! }) as Reading)
    const answer = judge(lampAndHeater, slipped)
    expect(answer.outcome).toBe('cannot-be')
    expect(answer.reading).toBe('r4')
    const again = { ...slipped[3]!, id: 'r6' }
    expect(judge(lampAndHeater, [...slipped, again]).outcome).toBe('two-faults')
  })
})
