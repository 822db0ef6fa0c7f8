import { describe, expect, it } from 'vitest'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { settledNetlist, type LinearElement, type SettledNetlist } from '@/diagrams/solver/settled-netlist'
import {
  fraction,
  minus,
  over,
  plus,
  solveExactly,
  times,
  toNumber,
  type Fraction,
} from '@/tests/support/exact'
import { inCondition, madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'

/** A battery on a ground strap, a switch and a lamp: the strap's faults leave all of it floating. */
const circuit = madeCircuit(
  [
    { id: 'bat', kind: 'battery', ohms: 0.005 },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }] },
    { id: 'lamp', kind: 'load', ohms: 6 },
    { id: 'g1', kind: 'ground' },
    { id: 'g2', kind: 'ground' },
  ],
  ['bat.pos > sw.in', 'sw.out > lamp.a', 'lamp.b > g1.in', 'bat.neg > g2.in'],
  { controls: [onOff('key')] },
)
const faults: (PlantedFault | undefined)[] = [
  undefined,
  ...['wire:w1', 'wire:w2', 'wire:w3', 'wire:w4', 'part:g1', 'part:g2', 'part:lamp'].flatMap((site) =>
    [1e3, 1e9, 1e12].map((ohms): PlantedFault => ({ site, mode: ohms < 1e9 ? 'resistive' : 'open', ohms })),
  ),
  { site: 'wire:w2', mode: 'short-to-ground', ohms: 0.01 },
  { site: 'part:lamp', mode: 'shorted', ohms: 0.01 },
]

/** Volts per net, exactly, with more elements put in and a current driven into one net out of another. */
function exactVolts(netlist: SettledNetlist, more: LinearElement[], driven?: [number, number]): Fraction[] {
  const zero = fraction(0)
  const one = fraction(1)
  const size = netlist.nets - 1
  const matrix = Array.from({ length: size }, () => Array.from({ length: size }, () => zero))
  const right = Array.from({ length: size }, () => zero)
  const add = (i: number, j: number, x: Fraction) => {
    if (i > 0 && j > 0) matrix[i - 1]![j - 1] = plus(matrix[i - 1]![j - 1]!, x)
  }
  const put = (i: number, x: Fraction) => {
    if (i > 0) right[i - 1] = plus(right[i - 1]!, x)
  }
  for (const { a, b, ohms, volts } of [...netlist.elements, ...more]) {
    const g = over(one, fraction(ohms))
    add(a, a, g)
    add(b, b, g)
    add(a, b, minus(zero, g))
    add(b, a, minus(zero, g))
    const amps = driven ? zero : times(g, fraction(volts))
    put(a, amps)
    put(b, minus(zero, amps))
  }
  if (driven) {
    put(driven[0], one)
    put(driven[1], fraction(-1))
  }
  return [zero, ...solveExactly(matrix, right)]
}

describe('what a meter shows, against exact fractions with the meter put in', () => {
  it('is within a microvolt, floating or not', () => {
    let worst = 0
    for (const fault of faults) {
      const condition = inCondition({ controls: { key: 'on' } })
      const netlist = settledNetlist(circuit, condition, fault)
      if (!netlist.ok) throw new Error(netlist.problem.message)
      for (const [red, black] of [
        ['bat.pos', 'chassis'],
        ['lamp.b', 'chassis'],
        ['lamp.a', 'lamp.b'],
        ['bat.neg', 'lamp.b'],
      ] as const) {
        const [a, b] = [netlist.value.netOf.get(red)!, netlist.value.netOf.get(black)!]
        const meter = { name: 'meter', a, b, ohms: 10e6, volts: 0 }
        const volts = exactVolts(netlist.value, [meter])
        const shown = measure(circuit, { kind: 'volts', red, black, condition }, fault)
        if (!shown.ok) throw new Error(shown.problem.message)
        worst = Math.max(worst, Math.abs(Number(shown.value) - toNumber(minus(volts[a]!, volts[b]!))))
      }
    }
    console.log(`voltmeter against exact fractions: worst ${worst.toExponential(1)} V`)
    expect(worst).toBeLessThan(1e-6)
  }, 60_000)

  it('in ohms is within a thousandth, and OL when and only when it is over 40 Mohm', () => {
    let worst = 0
    for (const fault of faults)
      for (const key of ['off', 'on']) {
        const condition = inCondition({ controls: { key }, battery: false })
        const netlist = settledNetlist(circuit, condition, fault)
        if (!netlist.ok) throw new Error(netlist.problem.message)
        const [red, black] = ['sw.in', 'chassis']
        const a = netlist.value.netOf.get(red)!
        const truth = toNumber(exactVolts(netlist.value, [], [a, 0])[a]!)
        const shown = measure(circuit, { kind: 'ohms', red, black, condition }, fault)
        if (!shown.ok) throw new Error(shown.problem.message)
        expect(shown.value === 'OL', JSON.stringify(fault)).toBe(truth > 40e6)
        if (shown.value !== 'OL') worst = Math.max(worst, Math.abs(Number(shown.value) / truth - 1))
      }
    console.log(`ohmmeter against exact fractions: worst ${worst.toExponential(1)} of the reading`)
    expect(worst).toBeLessThan(1e-3)
  }, 60_000)
})
