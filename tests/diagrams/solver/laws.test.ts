import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { branchAmps, theveninOhms, voltsAt, type Case, type Settled } from '@/diagrams/solver/case'
import { leakSiemens } from '@/diagrams/solver/constants'
import { openCase } from '@/diagrams/solver/faulted-case'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { seededRandom } from '@/tests/support/random'
import { randomCircuit } from '@/tests/support/random-circuit'
import { randomFault } from '@/tests/support/random-fault'

const seeds = fc.integer({ min: 1, max: 1_000_000 })
const runs = { numRuns: 60, seed: 20_261_201 }

function settle(circuit: Circuit, seed: number, change: object = {}, fault?: PlantedFault) {
  const controls = seededRandom(seed).pick(controlCombinations(circuit, 50))
  const opened = openCase(circuit, { ...restCondition, controls, ...change }, fault)
  if (!opened.ok) throw new Error(opened.problem.message)
  const { given, severity } = opened.value
  return { given, severity, settled: given.settle(severity) }
}

/** Amperes that leave each unknown through all its branches and its leak, and the most that any one carries. */
function balance(given: Case, settled: Settled) {
  const { network } = given.study
  const leaving = new Float64Array(network.size)
  const largest = new Float64Array(network.size)
  network.branches.forEach(({ a, b }, i) => {
    const amps = branchAmps(given, settled, i)
    const siemens = settled.located.base.conductance[i]!
    for (const [unknown, sign] of [
      [a, 1],
      [b, -1],
    ] as const) {
      if (unknown < 0) continue
      leaving[unknown]! += sign * amps
      // What rounding the volts at its ends may put on a branch's amperes: those with the fault, which are the
      // volts without it less what the fault takes away.
      const volts = Math.max(Math.abs(voltsAt(settled, unknown)), Math.abs(without(settled, unknown)))
      largest[unknown]! += Math.abs(amps) + siemens * 1e-3 * volts
    }
  })
  const { p, q, branch, touches } = settled.located
  if (touches && branch < 0) {
    const amps = settled.siemens * (voltsAt(settled, p) - voltsAt(settled, q))
    if (p >= 0) leaving[p]! += amps
    if (q >= 0) leaving[q]! -= amps
  }
  for (let i = 0; i < leaving.length; i++) leaving[i]! += leakSiemens * voltsAt(settled, i)
  return { leaving, largest }
}

function without({ located: { base }, scale }: Settled, unknown: number): number {
  return scale * base.voltsBattery[unknown]! + base.voltsFixed[unknown]!
}

describe('Kirchhoff', () => {
  it('what flows into every point flows out again, good or faulty', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const circuit = randomCircuit(seed, 3)
        const fault = seed % 2 === 0 ? randomFault(circuit, seededRandom(seed)) : undefined
        const { given, settled } = settle(circuit, seed, {}, fault)
        if (!settled) return
        const { leaving, largest } = balance(given, settled)
        leaving.forEach((amps, i) => expect(Math.abs(amps)).toBeLessThanOrEqual(1e-9 + 1e-12 * largest[i]!))
      }),
      runs,
    )
  })
})

describe('superposition', () => {
  it('twice the battery, with the parts held as they are, adds the battery’s share once more everywhere', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: 0.5, max: 2, noNaN: true }), (seed, scale) => {
        const { given, severity, settled } = settle(randomCircuit(seed, 3), seed)
        if (!settled) return
        const at = (times: number) => given.solve(settled.states, severity, times)
        const [none, one, more] = [at(0), at(1), at(scale)]
        for (let i = 0; i < given.study.network.size; i++) {
          const sum = voltsAt(none, i) + scale * (voltsAt(one, i) - voltsAt(none, i))
          expect(Math.abs(voltsAt(more, i) - sum)).toBeLessThan(1e-9)
        }
      }),
      runs,
    )
  })
})

describe('Thevenin resistance', () => {
  const pairOf = (seed: number, given: Case): [number, number] => {
    const random = seededRandom(seed + 7)
    const { size } = given.study.network
    return [random.whole(0, size - 1), random.whole(-1, size - 1)]
  }

  it('is the same with the leads swapped, and never negative', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const { given, settled } = settle(randomCircuit(seed, 3), seed, { battery: false })
        const [a, b] = pairOf(seed, given)
        const [there, back] = [theveninOhms(settled!, a, b), theveninOhms(settled!, b, a)]
        expect(there).toBeGreaterThanOrEqual(0)
        expect(Math.abs(there - back)).toBeLessThanOrEqual(1e-9 * there)
      }),
      runs,
    )
  })

  it('never rises when a lead is added, wherever it goes', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: 0.01, max: 1e6, noNaN: true }), (seed, ohms) => {
        const circuit = randomCircuit(seed, 3)
        const random = seededRandom(seed + 3)
        const ends = circuit.wires.flatMap((wire) => [wire.from, wire.to])
        const from = random.pick(ends)
        const to = random.pick(['chassis', ...ends.filter((end) => end !== from)])
        const added = [{ from, to, ohms }]
        const before = settle(circuit, seed, { battery: false })
        const after = settle(circuit, seed, { battery: false, added })
        const [a, b] = pairOf(seed, before.given)
        const was = theveninOhms(before.settled!, a, b)
        expect(theveninOhms(after.settled!, a, b)).toBeLessThanOrEqual(was * (1 + 1e-9) + 1e-12)
      }),
      runs,
    )
  })

  it('never falls when a fault opens or corrodes something in a dead circuit', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const circuit = randomCircuit(seed, 3)
        const wire = seededRandom(seed).pick(circuit.wires)
        const before = settle(circuit, seed, { battery: false })
        const after = settle(
          circuit,
          seed,
          { battery: false },
          { site: `wire:${wire.id}`, mode: 'resistive', ohms: 50 },
        )
        const [a, b] = pairOf(seed, before.given)
        const was = theveninOhms(before.settled!, a, b)
        expect(theveninOhms(after.settled!, a, b)).toBeGreaterThanOrEqual(was * (1 - 1e-9))
      }),
      runs,
    )
  })
})

describe('a fault of no size', () => {
  it('in series or across at next to nothing or at next to everything is no fault at all', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const circuit = randomCircuit(seed, 3)
        const wire = seededRandom(seed).pick(circuit.wires)
        const good = settle(circuit, seed)
        if (!good.settled) return
        const tiny = settle(circuit, seed, {}, { site: `wire:${wire.id}`, mode: 'resistive', ohms: 1e-12 })
        const { size } = good.given.study.network
        for (let i = 0; i < size; i++)
          expect(Math.abs(voltsAt(tiny.settled!, i) - voltsAt(good.settled, i))).toBeLessThan(1e-7)
      }),
      runs,
    )
  })
})
