import { describe, expect, it } from 'vitest'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { samples } from '@/diagrams/samples/all-samples'
import { inCondition, madeCircuit, onOff, whenOn } from '../../support/made-circuit'
import { perturbCircuit } from '../../support/perturbed-circuit'
import { seededRandom } from '../../support/random'
import { traceFault } from '../../support/trace-fault'

const lamp = madeCircuit(
  [
    { id: 'bat', kind: 'battery', x: 0, y: 0 },
    { id: 'f1', kind: 'fuse', amps: 10, x: 0, y: 0 },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('key') }], x: 0, y: 0 },
    { id: 'l', kind: 'load', ohms: 6, x: 0, y: 0 },
    { id: 'g', kind: 'ground', x: 0, y: 0 },
  ],
  ['bat.pos > f1.in', 'f1.out > sw.a', 'sw.b > l.a', 'l.b > g.in'],
  { controls: [onOff('key')] },
)

function answer(readings: unknown[]) {
  const opened = openEvaluationRequest({ circuit: lamp, readings })
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
  return evaluate(opened.value)
}

describe('a circuit with nothing wrong', () => {
  it('is not called so before anything was read', () => {
    expect(answer([]).outcome).toBe('narrowed')
  })

  it('is called so on good vehicles in the end, on every sample tried', () => {
    const random = seededRandom(5).next
    for (const circuit of [lamp, samples[1]!, samples[4]!]) {
      const run = traceFault(circuit, perturbCircuit(circuit, 12.4, random), undefined, random, 40)
      expect(run.answer.outcome, `${circuit.title} after ${run.readings.length}`).toBe('no-fault')
    }
  }, 120_000)

  it('is not called so while a reading is worth 0.05 bit, nor once a reading was wrong', () => {
    const condition = inCondition({ controls: { key: 'on' } })
    const one = answer([{ id: 'r1', kind: 'works', node: 'l', condition, value: true }])
    if (one.outcome === 'narrowed')
      expect(Math.max(...one.next.map(({ bits }) => bits))).toBeGreaterThanOrEqual(0.05)
    const wrong = answer([{ id: 'r1', kind: 'works', node: 'l', condition, value: false }])
    expect(wrong.outcome).not.toBe('no-fault')
  })
})
