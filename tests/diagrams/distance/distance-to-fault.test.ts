import { describe, expect, it } from 'vitest'
import { measuredBy } from '@/diagrams/distance/measured'
import { unplugFor } from '@/diagrams/distance/open-ends'
import { distanceProbes, distanceToFault, type DistanceRequest } from '@/diagrams/distance-to-fault'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { neighbourWires } from '@/diagrams/document/sites'
import { samples } from '@/diagrams/samples/all-samples'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

const exactMeter = { percent: 0, floor: 0 }

/** What an exact meter shows on the faulty circuit, as readings of a trace. */
function readOff(
  circuit: Circuit,
  probes: readonly Probe[],
  fault?: PlantedFault,
  accuracy: { percent: number; floor: number } | undefined = exactMeter,
): Reading[] {
  return probes.map((probe, i) => {
    const shown = measure(circuit, probe, fault)
    if (!shown.ok) throw new Error(shown.problem.message)
    return { id: `R${i + 1}`, ...probe, value: shown.value, accuracy } as Reading
  })
}

function found(request: DistanceRequest) {
  const answer = distanceToFault(request)
  if (!answer.ok) throw new Error(answer.problem.message)
  return answer.value
}

function refusal(request: DistanceRequest): string {
  const answer = distanceToFault(request)
  if (answer.ok) throw new Error(`not refused: ${answer.value.says}`)
  return answer.problem.message
}

/** A lamp fed over two inline connectors, with a wire of its own length and size between them. */
function lampCircuit({
  length = 4,
  mm2 = 0.5,
  ohms,
}: {
  length?: number
  mm2?: number
  ohms?: number
} = {}): Circuit {
  const opened = openCircuit({
    format: 'halfsplit-circuit',
    version: 1,
    title: 'made for a test',
    connectors: [
      { id: 'c210', label: 'C210', cavities: 4 },
      { id: 'c310', label: 'C310', cavities: 4 },
    ],
    nodes: [
      { id: 'bat', kind: 'battery' },
      { id: 'f1', kind: 'fuse', label: 'F1', amps: 10 },
      { id: 'c210-1', kind: 'cavity', connector: 'c210', number: 1 },
      { id: 'c210-2', kind: 'cavity', connector: 'c210', number: 2 },
      { id: 'c310-1', kind: 'cavity', connector: 'c310', number: 1 },
      { id: 'c310-2', kind: 'cavity', connector: 'c310', number: 2 },
      { id: 'lamp', kind: 'load', label: 'Lamp', ohms: 12 },
      { id: 'fan', kind: 'load', label: 'Fan', ohms: 2 },
      { id: 's1', kind: 'splice', label: 'S1' },
      { id: 'g1', kind: 'ground', label: 'G1' },
    ],
    wires: [
      { id: 'w1', from: 'bat.pos', to: 'f1.in' },
      { id: 'w2', from: 'f1.out', to: 'c210-1.a' },
      { id: 'w3', from: 'c210-1.b', to: 'c310-1.a', length, mm2, ...(ohms ? { ohms } : {}) },
      { id: 'w4', from: 'c310-1.b', to: 'lamp.a' },
      { id: 'w5', from: 'f1.out', to: 'c210-2.a' },
      { id: 'w6', from: 'c310-2.a', to: 'c210-2.b', length: 3 },
      { id: 'w7', from: 'c310-2.b', to: 'fan.a' },
      { id: 'w8', from: 'lamp.b', to: 's1.s' },
      { id: 'w9', from: 'fan.b', to: 's1.s' },
      { id: 'w10', from: 's1.s', to: 'g1.in' },
    ],
  })
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
  return opened.value
}

describe('a short planted in the middle of a wire is found in its middle', () => {
  const cases = samples.flatMap((circuit) =>
    circuit.wires
      .filter((wire) => unplugFor(circuit, wire.from) !== null && unplugFor(circuit, wire.to) !== null)
      .flatMap((wire) => [
        { circuit, wire, fault: { site: `wire:${wire.id}`, mode: 'short-to-ground' as const, ohms: 3 } },
        ...neighbourWires(circuit, wire.id).map((other) => ({
          circuit,
          wire,
          fault: { site: `wire:${wire.id}`, mode: 'short-to-wire' as const, ohms: 0.4, other },
        })),
      ]),
  )

  it('on every wire of the samples that can be unplugged at both ends, to ground and to the wire beside', () => {
    expect(cases.length).toBeGreaterThan(40)
    const missed: string[] = []
    for (const { circuit, wire, fault } of cases) {
      const other = 'other' in fault ? fault.other : null
      const readings = readOff(circuit, distanceProbes(circuit, wire.id, other), fault)
      const answer = distanceToFault({ circuit, wire: wire.id, readings })
      const what = `${circuit.title} ${wire.id} ${fault.mode} ${other}`
      if (!answer.ok) {
        missed.push(`${what}: ${answer.problem.message}`)
        continue
      }
      const { metres, giveOrTakeMetres, useful, faultOhms } = answer.value
      expect(useful, what).toBe(true)
      expect(Math.abs(metres / wire.length - 0.5), what).toBeLessThan(1e-3)
      expect(giveOrTakeMetres, what).toBeLessThan(0.06 * wire.length)
      // With the way back from it: chassis and a ground, or a piece of the other wire.
      expect(faultOhms! - fault.ohms, what).toBeGreaterThan(-1e-3)
      expect(faultOhms! - fault.ohms, what).toBeLessThan(0.15)
    }
    // Only where the wire beside it ends in something that cannot be unplugged.
    expect(missed.filter((line) => !line.includes('short-to-wire'))).toEqual([])
    expect(missed.length).toBeLessThan(cases.length / 3)
  })

  it('from millivolts at the current that a lead feeds in, as a trace reads them', () => {
    const circuit = lampCircuit()
    const condition = {
      controls: {},
      unplugged: ['c210', 'c310'],
      battery: true,
      charging: false,
      // A test lamp from the battery to the open end.
      added: [{ from: 'bat.pos', to: 'c210-1.b', ohms: 3 }],
    }
    const readings = readOff(
      circuit,
      [
        { kind: 'volts', red: 'c210-1.b', black: 'c310-1.a', condition },
        { kind: 'amps', wire: 'w3', condition },
      ],
      { site: 'wire:w3', mode: 'short-to-ground', ohms: 1 },
    )
    const { method, metres, readings: used } = found({ circuit, wire: 'w3', readings })
    expect(method).toBe('drop')
    expect(metres).toBeCloseTo(2, 5)
    expect(used).toEqual(['R1', 'R2'])
  })
})

describe('a short anywhere along a wire', () => {
  const [length, mm2] = [4, 0.5]
  const ohmsPerMetre = 0.01724 / mm2

  /** The figures by hand: the piece, the short, the rest; both ends open. */
  function byHand(place: number, faultOhms: number, accuracy = exactMeter): Reading[] {
    const circuit = lampCircuit({ length, mm2 })
    const whole = ohmsPerMetre * length
    const values = [place * whole + faultOhms, (1 - place) * whole + faultOhms, whole]
    return distanceProbes(circuit, 'w3').map(
      (probe, i) => ({ id: `R${i + 1}`, ...probe, value: values[i]!, accuracy }) as Reading,
    )
  }

  it.each([0, 0.1, 0.33, 0.5, 0.87, 1])('at %s of its length', (place) => {
    const circuit = lampCircuit({ length, mm2 })
    const { metres, lowMetres, highMetres } = found({ circuit, wire: 'w3', readings: byHand(place, 5) })
    expect(metres).toBeCloseTo(place * length, 4)
    expect(lowMetres).toBeLessThanOrEqual(place * length + 1e-6)
    expect(highMetres).toBeGreaterThanOrEqual(place * length - 1e-6)
  })

  it('is told from the nearer end, in centimetres', () => {
    const circuit = lampCircuit({ length, mm2 })
    const says = (place: number) =>
      found({ circuit, wire: 'w3', readings: byHand(place, 0.3, { percent: 0, floor: 0.003 }) }).says
    // By hand: 4 m · (6 mohm / (2 · 137.9 mohm) + 0.17 · 3/137.9) = 10.2 cm, rounded up.
    expect(says(0.33)).toBe('The short lies 1.32 m from C210 cavity 1, side b, give or take 11 cm.')
    expect(says(0.8)).toMatch(/^The short lies 0\.80 m from C310 cavity 1, side a, give or take \d\d cm\.$/)
  })

  it('is not told where a common meter cannot say it: a tenth of an ohm of wire, two tenths of error', () => {
    const circuit = lampCircuit({ length, mm2 })
    const { useful, says, giveOrTakeMetres } = found({
      circuit,
      wire: 'w3',
      readings: byHand(0.3, 5).map(({ accuracy: _, ...reading }) => reading as Reading),
    })
    expect(useful).toBe(false)
    expect(giveOrTakeMetres).toBeGreaterThan(length / 2)
    expect(says).toMatch(
      /^These readings are good to give or take \d+\.\d\d m on 4\.00 m of wire: they do not say where the short lies\. Millivolts/,
    )
  })

  it('one reading of a dead short says how far at most', () => {
    const circuit = lampCircuit({ length, mm2, ohms: 10 })
    const condition = distanceProbes(circuit, 'w3')[0]!.condition
    const reading = {
      id: 'R1',
      kind: 'ohms',
      red: 'c310-1.a',
      black: 'chassis',
      value: 2,
      condition,
    } as Reading
    expect(found({ circuit, wire: 'w3', readings: [reading] }).says).toBe(
      'The short lies at most 0.94 m from C310 cavity 1, side a. Ohms from the other end would say where.',
    )
  })

  it('millivolts from both ends need no resistance of the wire', () => {
    const circuit = lampCircuit({ length, mm2, ohms: 99 })
    const meter = { percent: 0, floor: 0 }
    const drop = (end: 'from' | 'to', volts: number, amps: number) => ({
      end,
      volts: measuredBy(volts, meter),
      amps: measuredBy(amps, meter),
    })
    // 30 ohm before, 69 ohm behind: by the ratio alone 30/99 of the length.
    const { method, metres } = found({
      circuit,
      wire: 'w3',
      readings: [],
      drops: [drop('from', 3, 0.1), drop('to', 13.8, 0.2)],
    })
    expect(method).toBe('both-drops')
    expect(metres).toBeCloseTo((length * 30) / 99, 6)
  })

  it('a hot wire has more ohms a metre, so that the same drop is a shorter way', () => {
    const circuit = lampCircuit({ length, mm2 })
    const drops = [
      {
        end: 'from' as const,
        volts: measuredBy(0.1, { percent: 0.5, floor: 0.0002 }),
        amps: measuredBy(2, { percent: 1, floor: 0.01 }),
      },
    ]
    const cold = found({ circuit, wire: 'w3', readings: [], drops })
    const hot = found({ circuit, wire: 'w3', readings: [], drops, celsius: 90 })
    expect(cold.metres).toBeCloseTo(0.1 / 2 / ohmsPerMetre, 3)
    // 70 kelvin at 0.393 % each.
    expect(cold.metres / hot.metres).toBeCloseTo(1.2751, 3)
    expect(cold.giveOrTakeMetres).toBeGreaterThan(0.05 * cold.metres)
  })

  it('test leads not taken off cost sureness only where the whole wire is read through them', () => {
    const circuit = lampCircuit({ length, mm2, ohms: 5 })
    const condition = distanceProbes(circuit, 'w3')[0]!.condition
    const lead = 0.3
    const ohms = (red: string, black: string, value: number, i: number) =>
      ({
        id: `R${i}`,
        kind: 'ohms',
        red,
        black,
        value: value + lead,
        condition,
        accuracy: { percent: 0, floor: 0.01 },
      }) as Reading
    const readings = [
      ohms('c210-1.b', 'chassis', 1 + 2, 1),
      ohms('c310-1.a', 'chassis', 4 + 2, 2),
      ohms('c210-1.b', 'c310-1.a', 5, 3),
    ]
    const kept = found({ circuit, wire: 'w3', readings, leads: { low: 0, high: 0.5 } })
    expect(kept.lowMetres).toBeLessThanOrEqual(0.8)
    expect(kept.highMetres).toBeGreaterThanOrEqual(0.8)
    const zeroed = found({
      circuit,
      wire: 'w3',
      readings: readings.map(
        (reading) => ({ ...reading, value: (reading.value as number) - lead }) as Reading,
      ),
    })
    expect(zeroed.metres).toBeCloseTo(0.8, 6)
    expect(zeroed.giveOrTakeMetres).toBeLessThan(kept.giveOrTakeMetres)
  })
})

describe('a refusal says what is wrong and what to do', () => {
  const circuit = lampCircuit({ ohms: 10 })
  const open = distanceProbes(circuit, 'w3')[0]!.condition
  const ohms = (red: string, value: number | 'OL', id: string, condition = open, black = 'chassis') =>
    ({ id, kind: 'ohms', red, black, value, condition }) as Reading

  it('when nothing was read at the wire', () => {
    expect(refusal({ circuit, wire: 'w3', readings: [] })).toBe(
      'Unplug both ends of the wire C210 cavity 1 to C310 cavity 1 and read ohms from each end to what it touches.',
    )
  })

  it('when an end was still joined to something', () => {
    const half = { ...open, unplugged: ['c210'] }
    expect(refusal({ circuit, wire: 'w3', readings: [ohms('c210-1.b', 3, 'R4', half)] })).toMatch(
      /^R4 cannot be used: another part is still joined to the wire\. Unplug both ends/,
    )
  })

  it('when the wire ends in a splice', () => {
    expect(refusal({ circuit, wire: 'w10', readings: [] })).toBe(
      'The wire S1 to G1 cannot be opened at S1 and at G1. Part it there first, then read from both ends.',
    )
  })

  it('when nothing touches', () => {
    expect(refusal({ circuit, wire: 'w3', readings: [ohms('c210-1.b', 'OL', 'R1')] })).toBe(
      'R1 shows OL: the wire C210 cavity 1 to C310 cavity 1 touches nothing there.',
    )
  })

  it('when the two ends differ by more than the wire has', () => {
    expect(
      refusal({ circuit, wire: 'w3', readings: [ohms('c210-1.b', 40, 'R1'), ohms('c310-1.a', 2, 'R2')] }),
    ).toBe(
      'The readings differ by more than the 10 ohm of the wire C210 cavity 1 to C310 cavity 1 allows. Take them again from its own two ends.',
    )
  })

  it('when both together are less than the wire has', () => {
    expect(
      refusal({ circuit, wire: 'w3', readings: [ohms('c210-1.b', 3, 'R1'), ohms('c310-1.a', 3, 'R2')] }),
    ).toMatch(/^The readings from both ends add up to less than the 10 ohm of the wire/)
  })

  it('when the wire is not as drawn', () => {
    expect(
      refusal({
        circuit,
        wire: 'w3',
        readings: [
          ohms('c210-1.b', 15, 'R1'),
          ohms('c310-1.a', 15, 'R2'),
          ohms('c210-1.b', 25, 'R3', open, 'c310-1.a'),
        ],
      }),
    ).toMatch(
      /reads 25 ohm from end to end, where its length and size give 10 ohm\. Check both in the drawing/,
    )
  })

  it('when there is no such wire, no current, or a temperature that no wire has', () => {
    expect(refusal({ circuit, wire: 'w99', readings: [] })).toBe('wire "w99" does not exist')
    const none = { end: 'from' as const, volts: measuredBy(1, exactMeter), amps: measuredBy(0, exactMeter) }
    expect(refusal({ circuit, wire: 'w3', readings: [], drops: [none] })).toMatch(/^No current was measured/)
    expect(refusal({ circuit, wire: 'w3', readings: [], celsius: NaN })).toMatch(/-60 to 200/)
    expect(refusal({ circuit, wire: 'w3', readings: [], leads: { low: -1, high: 0 } })).toMatch(
      /0 to 100 ohm/,
    )
  })
})
