import { describe, expect, it } from 'vitest'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { restCondition } from '@/diagrams/document/condition-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'

/** A battery, a long chain of splices and a lamp at its end. */
function chain(parts: number): object {
  const splices = Array.from({ length: parts - 3 }, (_, i) => ({ id: `sp${i}`, kind: 'splice' }))
  const ends = ['bat.pos', ...splices.flatMap(({ id }) => [`${id}.s`, `${id}.s`]), 'h1.a']
  const wires = Array.from({ length: ends.length / 2 }, (_, i) => ({
    id: `w${i}`,
    from: ends[2 * i],
    to: ends[2 * i + 1],
    length: 0.01,
  }))
  return {
    format: 'halfsplit-circuit',
    version: 1,
    title: 'Long line',
    nodes: [
      { id: 'bat', kind: 'battery' },
      ...splices,
      { id: 'h1', kind: 'load', ohms: 6 },
      { id: 'g1', kind: 'ground' },
    ],
    wires: [...wires, { id: 'wg', from: 'h1.b', to: 'g1.in' }],
  }
}

describe('a circuit of 5,000 parts', () => {
  it('is refused by the evaluator at once, with its size and what to do', () => {
    const opened = openEvaluationRequest({ circuit: chain(5_000) })
    expect(opened.ok).toBe(false)
    if (opened.ok) return
    expect(opened.problems[0]!.path).toBe('circuit.nodes')
    expect(opened.problems[0]!.message).toMatch(/^5000 parts and 4999 wires .* draw the part of the vehicle/)
  }, 20_000)

  it('is still solved: the lamp at its end gets what the wires leave', () => {
    const circuit = openCircuit(chain(5_000))
    if (!circuit.ok) throw new Error(circuit.problems[0]!.message)
    const point = solveOperatingPoint(circuit.value, restCondition)
    if (!point.ok) throw new Error(point.problem.message)
    // 4,998 wires of 10 mm and 0.75 mm2, each 0.01724 · 0.01 / 0.75 ohm; one more of a metre to ground.
    const wires = (4_998 * 0.01724 * 0.01) / 0.75 + 0.01724 / 0.75
    const expected = (12.6 * 6) / (6 + wires + 0.02 + 0.002)
    expect(point.value.loads.get('h1')!.volts).toBeCloseTo(expected, 4)
  }, 20_000)
})

describe('a circuit of 100 parts in a line', () => {
  it('is answered, with every place named', () => {
    const opened = openEvaluationRequest({ circuit: chain(100) })
    if (!opened.ok) throw new Error(opened.problems[0]!.message)
    const answer = evaluate(opened.value)
    expect(answer.outcome).toBe('narrowed')
    expect(answer.next.length).toBeGreaterThan(0)
  }, 60_000)
})
