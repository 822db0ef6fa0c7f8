import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { posteriorOf } from '@/diagrams/faults/posterior'
import { walkCircuit } from '@/diagrams/planner/policies/circuit-walk'
import { halfSplit } from '@/diagrams/planner/policies/half-split'
import type { Policy } from '@/diagrams/planner/policies/policy'
import { randomPolicy } from '@/diagrams/planner/policies/random-policy'
import { walk } from '@/diagrams/planner/policies/walk'
import { samples } from '@/diagrams/samples/all-samples'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { madeCircuit } from '../../support/made-circuit'
import { seededRandom } from '../../support/random'
import { takeReading } from '../../support/take-reading'

/** Eight splices in a row between a battery and a lamp. */
const chain = madeCircuit(
  [
    { id: 'bat', kind: 'battery', x: 0, y: 0 },
    ...Array.from({ length: 8 }, (_, i) => ({ id: `s${i + 1}`, kind: 'splice' as const, x: 0, y: 0 })),
    { id: 'l', kind: 'load', ohms: 10, x: 0, y: 0 },
    { id: 'g', kind: 'ground', x: 0, y: 0 },
  ],
  [
    'bat.pos > s1.s',
    ...Array.from({ length: 7 }, (_, i) => `s${i + 1}.s > s${i + 2}.s`),
    's8.s > l.a',
    'l.b > g.in',
  ],
)

function ask(policy: Policy, circuit: Circuit, readings: Reading[] = []): Probe | null {
  const model = faultModelOf(circuit)
  return policy({ model, posterior: posteriorOf(model, weighReadings(model, readings), 'trade'), readings })
}
const point = (probe: Probe | null) => (probe && 'red' in probe ? probe.red : null)

describe('the walk along a circuit', () => {
  it('goes from the feed through wires and parts to ground, each point once', () => {
    expect(walkCircuit(chain).stops.map((stop) => stop.point)).toEqual([
      'bat.pos',
      ...Array.from({ length: 8 }, (_, i) => `s${i + 1}.s`),
      'l.a',
      'l.b',
      'g.in',
    ])
  })

  it('puts a wire behind its first end and before its second', () => {
    const { stops, stepOf } = walkCircuit(chain)
    const at = (name: string) => stops.find((stop) => stop.point === name)!
    expect(stepOf('wire:w3')).toBeGreaterThan(at('s2.s').step)
    expect(stepOf('wire:w3')).toBeLessThan(at('s3.s').step)
  })

  it('holds every wired point of every sample', () => {
    for (const circuit of samples) {
      const ends = new Set(circuit.wires.flatMap((wire) => [wire.from, wire.to]))
      expect(new Set(walkCircuit(circuit).stops.map((stop) => stop.point))).toEqual(ends)
    }
  })
})

describe('ways to choose the next reading', () => {
  it('half-split measures in the middle of what is in question', () => {
    expect(['s3.s', 's4.s', 's5.s', 's6.s']).toContain(point(ask(halfSplit, chain)))
  })

  it('the walk starts at the feed and goes on from there', () => {
    expect(point(ask(walk, chain))).toBe('bat.pos')
    const first = takeReading('r1', chain, ask(walk, chain)!, { site: 'wire:w7', mode: 'open' }, () => 0.5)!
    expect(point(ask(walk, chain, [first]))).toBe('s1.s')
  })

  it('chance is the same for the same seed, and another for another', () => {
    const asked = (seed: number) => JSON.stringify(ask(randomPolicy(seed), chain))
    expect(asked(3)).toBe(asked(3))
    expect(new Set([1, 2, 3, 4, 5, 6].map(asked)).size).toBeGreaterThan(2)
  })

  it('none repeats a reading or asks for one that cannot be taken', () => {
    const random = seededRandom(9)
    for (const circuit of [chain, samples[0]!, samples[1]!])
      for (const policy of [halfSplit, walk, randomPolicy(2)]) {
        const readings: Reading[] = []
        const seen = new Set<string>()
        for (let i = 0; i < 12; i++) {
          const probe = ask(policy, circuit, readings)
          if (!probe) break
          expect(refuseReading(circuit, probe)).toBeNull()
          expect(seen).not.toContain(JSON.stringify(probe))
          seen.add(JSON.stringify(probe))
          const reading = takeReading(`r${i}`, circuit, probe, undefined, random.next)
          if (reading) readings.push(reading)
          else break
        }
      }
  })
})
