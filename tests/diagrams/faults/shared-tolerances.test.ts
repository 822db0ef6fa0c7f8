import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { FaultModel } from '@/diagrams/faults/fault-model'
import { sensitivities } from '@/diagrams/faults/prediction'
import { sharedLog } from '@/diagrams/faults/shared-tolerances'
import { noAlteration } from '@/diagrams/solver/alteration'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { Case } from '@/diagrams/solver/case'
import { measure } from '@/diagrams/solver/meter'
import { Study } from '@/diagrams/solver/study'
import { madeCircuit } from '../../support/made-circuit'

/** A battery, a resistor in the line, a lamp and a ground wire. */
const line = (lampOhms: number) =>
  madeCircuit(
    [
      { id: 'bat', kind: 'battery' },
      { id: 'r1', kind: 'resistor', ohms: 2 },
      { id: 'h1', kind: 'load', ohms: lampOhms },
      { id: 'g1', kind: 'ground' },
    ],
    ['bat.pos > r1.a', 'r1.b > h1.a', 'h1.b > g1.in'],
  )
const dead = { ...restCondition, battery: false }
const probes: Probe[] = [
  { kind: 'volts', red: 'h1.a', black: 'chassis', condition: restCondition },
  { kind: 'volts', red: 'bat.pos', black: 'r1.b', condition: restCondition },
  { kind: 'amps', wire: 'w2', condition: restCondition },
  { kind: 'ohms', red: 'r1.a', black: 'chassis', condition: dead },
]

describe('what a part off the drawing does to a reading', () => {
  it('is what the solver finds when that part is drawn a thousandth off', () => {
    const circuit = line(6)
    const network = buildNetwork(circuit)
    const lamp = network.branchIndex.get('part:h1')!
    for (const probe of probes) {
      const given = new Case(new Study(network, probe.condition), noAlteration)
      const moves = sensitivities(given, given.settle(0)!, probe)!
      const [less, more] = [5.997, 6.003].map((ohms) => measure(line(ohms), probe))
      if (!less!.ok || !more!.ok) throw new Error('refused')
      const slope = ((more!.value as number) - (less!.value as number)) / Math.log(6.003 / 5.997)
      expect(moves[lamp]).toBeCloseTo(slope, 5)
    }
  })
})

/** The battery as drawn, no more and no less. */
const nominal = { low: 1, high: 1 }

describe('readings that share a part off the drawing', () => {
  const circuit = line(6)
  const model = new FaultModel(circuit)
  const reading = (id: string, value: number): Reading => ({
    ...probes[0]!,
    kind: 'volts',
    red: 'h1.a',
    black: 'chassis',
    id,
    value,
  })
  const expected = measure(circuit, probes[0]!)
  const volts = expected.ok ? (expected.value as number) : Number.NaN

  it('count its error once: taken twice, the joint density is that of two normals with one common part', () => {
    const readings = [reading('a', volts + 0.05), reading('b', volts + 0.05)]
    const network = model.network
    const given = new Case(new Study(network, restCondition), noAlteration)
    const moves = sensitivities(given, given.settle(0)!, readings[0]!)!
    const common = moves.reduce((sum, move) => sum + (move * 0.05) ** 2 / 3, 0)
    const own = ((0.005 * (volts + 0.05) + 0.02) / 2) ** 2
    // Two normals of variance own + common, correlation rho: ln of the joint density over the product.
    const rho = common / (own + common)
    const z = 0.05 / Math.sqrt(own + common)
    const joint = -0.5 * Math.log(1 - rho ** 2) - (z * z * (1 - rho)) / (1 - rho ** 2) + z * z
    const judged = readings.map((each) => model.judged(each))
    expect(sharedLog(readings, judged, 0, nominal)).toBeCloseTo(joint, 3)
    expect(rho).toBeGreaterThan(0.3)
  })

  it('say nothing together where there is one of them, or where one is a slip', () => {
    const one = [reading('a', volts)]
    expect(sharedLog(one, [model.judged(one[0]!)], 0, nominal)).toBe(0)
    const slip = [reading('a', volts), reading('b', volts - 5)]
    expect(
      sharedLog(
        slip,
        slip.map((each) => model.judged(each)),
        0,
        nominal,
      ),
    ).toBe(0)
  })
})
