import { describe, expect, it } from 'vitest'
import { measure } from '@/diagrams/solver/meter'
import worked from '@/tests/fixtures/worked-examples.json'
import { inCondition, madeCircuit } from '@/tests/support/made-circuit'
import {
  solveByCircuit,
  solveByFactor,
  type WorkedElement,
  type WorkedNetwork,
  type WorkedSolution,
} from '@/tests/support/worked-network'

/*
 * Published examples, sources in the fixture. Every network is solved twice: "by its equations"
 * goes straight through orderElimination and factorise, "as a circuit" makes it a document of
 * batteries, resistors and splices and goes through the whole solver.
 */
interface Expected {
  quantity: string
  of?: string | string[]
  published?: number
  value?: number
  unit: string
  tolerance?: number
}
interface Example {
  id: string
  kind?: string
  title: string
  reference_node?: string
  elements?: WorkedElement[]
  expected?: Expected[]
  balance_network?: { elements: WorkedElement[] }
  fault?: { element: string; to_ohm: number }
  expected_direction?: Record<string, 'up' | 'down'>
}
const examples: Example[] = worked.examples as Example[]
const vehicleCases: Example[] = worked.computed_vehicle_cases

/** Sums on a run of wire, no circuit: tests/diagrams/distance/handbook-sums.test.ts has them. */
const sumsOnWires = ['liec-awg14-run', 'bird-3.7', 'bird-3.11', 'bird-3.13', 'grob-strands']
/**
 * Solved by their equations only. A circuit leaks 1e-11 siemens at every point: half a percent of
 * 250 Mohm, and of the microampere that a voltmeter draws.
 */
const drownedByLeak = new Set(['liec-meter-load-true', 'liec-meter-load', 'veh-open-ground-meter'])

const perUnit: Record<string, number> = { A: 1, mA: 1e3, uA: 1e6, V: 1, mV: 1e3, W: 1, ohm: 1, kohm: 1e-3 }

function networkOf(example: Example): WorkedNetwork {
  return { referenceNode: example.reference_node!, elements: example.elements! }
}

function valueOf(solution: WorkedSolution, network: WorkedNetwork, { quantity, of, unit }: Expected): number {
  const scale = perUnit[unit]
  if (scale === undefined) throw new Error(`unit ${unit}`)
  const element = network.elements.find((e) => e.id === of)
  switch (quantity) {
    case 'node_voltage':
      return scale * solution.volts(of as string)
    case 'voltage':
      return scale * (solution.volts(of![0]!) - solution.volts(of![1]!))
    case 'current':
      return scale * solution.amps(of as string)
    case 'power':
      return scale * solution.amps(of as string) * (solution.volts(element!.a) - solution.volts(element!.b))
    case 'input_resistance':
      return (scale * element!.value) / solution.amps(of as string)
    default:
      throw new Error(`quantity ${quantity}`)
  }
}

function check(example: Example, solution: WorkedSolution) {
  expect(example.expected!.length).toBeGreaterThan(0)
  for (const expected of example.expected!) {
    const printed = expected.published ?? expected.value!
    // Our own vehicle cases are printed to nine digits.
    const tolerance = expected.tolerance ?? 1e-6 * Math.abs(printed)
    const found = valueOf(solution, networkOf(example), expected)
    const what = `${example.id}: ${expected.quantity} of ${String(expected.of)}: ${found} ${expected.unit}, printed ${printed}`
    expect(Math.abs(found - printed), what).toBeLessThanOrEqual(tolerance)
  }
}

const networks = [...examples.filter((e) => e.kind === 'network' || e.kind === 'fault'), ...vehicleCases]

describe('published networks come out as printed', () => {
  it.each(networks)('$id by its equations: $title', (example) => {
    check(example, solveByFactor(networkOf(example)))
  })
  it.each(networks.filter((e) => !drownedByLeak.has(e.id)))('$id as a circuit: $title', (example) => {
    check(example, solveByCircuit(networkOf(example)))
  })
})

describe('a short moves every figure the way the book says', () => {
  const example = examples.find((e) => e.kind === 'direction')!
  const network: WorkedNetwork = { referenceNode: '0', elements: example.elements! }
  // Counted behind the pair, so that what goes through the short is part of R2's.
  const figures = (solution: WorkedSolution): Record<string, number> => {
    const [r1, r3, r4] = [solution.amps('R1'), solution.amps('R3'), solution.amps('R4')]
    return {
      total_resistance: solution.volts('1') / (r3 + r4),
      total_current: r3 + r4,
      V12: solution.volts('1') - solution.volts('2'),
      V20: solution.volts('2'),
      I_R1: r1,
      I_R2: r3 + r4 - r1,
      I_R3: r3,
      I_R4: r4,
    }
  }
  const elements = network.elements.map((e) =>
    e.id === example.fault!.element ? { ...e, value: example.fault!.to_ohm } : e,
  )
  const cases = {
    'by its equations': [solveByFactor(network), solveByFactor({ ...network, elements })],
    'as a circuit': [solveByCircuit(network), solveByCircuit(network, example.fault!.element)],
  }
  for (const [how, [before, after]] of Object.entries(cases))
    it(`${example.id} ${how}: ${example.title}`, () => {
      const [was, is] = [figures(before!), figures(after!)]
      // The shorted part's own current includes the short, which lies across it.
      for (const [name, way] of Object.entries(example.expected_direction!))
        if (how === 'by its equations' || name !== 'I_R2')
          expect(Math.sign(is[name]! - was[name]!), name).toBe(way === 'up' ? 1 : -1)
    })
})

describe('a balanced loop test sends nothing through its galvanometer', () => {
  const loops = examples.filter((e) => e.kind === 'cable-fault')
  it.each(loops)('$id: $title', (example) => {
    const network = { referenceNode: '0', elements: example.balance_network!.elements }
    for (const solution of [solveByFactor(network), solveByCircuit(network)])
      expect(Math.abs(solution.amps('G') / solution.amps('E'))).toBeLessThan(1e-7)
  })
})

describe('sums that a network gives too', () => {
  it('ritter-loading: a 10 Mohm meter takes 0.1 % off behind 10 kohm', () => {
    const { inputs, expected } = examples.find((e) => e.id === 'ritter-loading') as unknown as {
      inputs: { source_ohm: number }
      expected: [{ published: number; tolerance: number }]
    }
    const circuit = madeCircuit(
      [
        { id: 'bat', kind: 'battery', volts: 10 },
        { id: 'r', kind: 'resistor', ohms: inputs.source_ohm },
        { id: 's', kind: 'splice' },
      ],
      ['bat.pos > r.a', 'r.b > s.s'],
    )
    const read = measure(circuit, { kind: 'volts', red: 's.s', black: 'chassis', condition: inCondition() })
    if (!read.ok) throw new Error(read.problem.message)
    const errorPercent = 100 * (1 - Number(read.value) / 10)
    expect(Math.abs(errorPercent - expected[0].published)).toBeLessThanOrEqual(expected[0].tolerance)
  })

  it('kul-2.10: a ladder whose every stage is twice the one before', () => {
    const expected = examples.find((e) => e.id === 'kul-2.10')!.expected!
    const elements: WorkedElement[] = [{ id: 'E', type: 'V', a: 'n0', b: 'ref', value: 1 }]
    for (let k = 0; k < 30; k++)
      elements.push(
        { id: `s${k}`, type: 'R', a: `n${k}`, b: `n${k + 1}`, value: 2 ** k },
        { id: `p${k}`, type: 'R', a: `n${k + 1}`, b: 'ref', value: 2 ** k },
      )
    const ohms = 1 / solveByFactor({ referenceNode: 'ref', elements }).amps('E')
    for (const { published, tolerance } of expected)
      expect(Math.abs(ohms - published!)).toBeLessThanOrEqual(tolerance!)
  })
})

describe('no published example is left out unsaid', () => {
  it('each is a network, a fault, a direction, a loop, a sum above or a sum on a wire', () => {
    const covered = new Set([
      ...networks.map((e) => e.id),
      ...examples.filter((e) => e.kind === 'direction' || e.kind === 'cable-fault').map((e) => e.id),
      'ritter-loading',
      'kul-2.10',
      ...sumsOnWires,
    ])
    expect(examples.map((e) => e.id).filter((id) => !covered.has(id))).toEqual([])
  })
})
