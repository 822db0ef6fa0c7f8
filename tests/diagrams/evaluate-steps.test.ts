import { describe, expect, it } from 'vitest'
import { evaluate, evaluateSteps } from '@/diagrams/evaluate'
import type { EvaluationRequest } from '@/diagrams/faults/request'
import type { Step } from '@/diagrams/faults/steps'
import { samples } from '@/diagrams/samples/all-samples'
import { exampleRequest } from '../app/support/example'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import type { Circuit } from '@/diagrams/document/circuit-schema'

function requestFor(circuit: Circuit): EvaluationRequest {
  return { circuit, readings: [], codes: [], priors: 'trade' }
}

/** An equal document that no model has been built for. */
function unknown(circuit: Circuit, title: string): Circuit {
  return { ...structuredClone(circuit), title }
}

function take(steps: Generator<Step, unknown, void>, most = Infinity): Step[] {
  const seen: Step[] = []
  while (seen.length < most) {
    const next = steps.next()
    if (next.done) break
    seen.push(next.value)
  }
  return seen
}

describe('evaluating in portions', () => {
  it('gives the very answer that evaluating at one go gives', () => {
    const opened = openEvaluationRequest(exampleRequest())
    if (!opened.ok) throw new Error('the example does not open')
    const steps = evaluateSteps(opened.value)
    let next = steps.next()
    while (!next.done) next = steps.next()
    expect(next.value).toEqual(evaluate(opened.value))
  })

  it('learns the circuit, then weighs the readings, then plans, each from its first to its last portion', () => {
    const opened = openEvaluationRequest(exampleRequest())
    if (!opened.ok) throw new Error('the example does not open')
    const circuit = unknown(opened.value.circuit, 'learned in order')
    const seen = take(evaluateSteps({ ...opened.value, circuit }))
    const stages = seen.map(({ stage }) => stage)
    expect([...new Set(stages)]).toEqual(['circuit', 'readings', 'planning'])
    expect(stages).toEqual(stages.toSorted((a, b) => order(a) - order(b)))
    const learned = seen.filter(({ stage }) => stage === 'circuit')
    expect(learned.map(({ done }) => done)).toEqual(learned.map((_, i) => i))
    for (const { done, of } of seen) expect(done).toBeLessThanOrEqual(of)
  })

  it('goes on learning a circuit where a question that was left has stopped', () => {
    const circuit = unknown(samples[2]!, 'left in the middle')
    const left = take(evaluateSteps(requestFor(circuit)), 5)
    expect(left.map(({ done }) => done)).toEqual([0, 1, 2, 3, 4])
    // As a message brings it: an equal document, another object.
    const again = take(evaluateSteps(requestFor(structuredClone(circuit))))
    expect(again[0]).toMatchObject({ stage: 'circuit', done: 5 })
    const third = take(evaluateSteps(requestFor(structuredClone(circuit))))
    expect(third.some(({ stage }) => stage === 'circuit')).toBe(false)
  })

  it('answers alike whether the circuit was learned in one piece or in several', () => {
    const circuit = unknown(samples[1]!, 'learned in pieces')
    take(evaluateSteps(requestFor(circuit)), 3)
    take(evaluateSteps(requestFor(structuredClone(circuit))), 4)
    expect(evaluate(requestFor(circuit))).toEqual(
      evaluate(requestFor(unknown(samples[1]!, 'learned in one piece'))),
    )
  })
})

function order(stage: Step['stage']): number {
  return ['circuit', 'readings', 'planning'].indexOf(stage)
}
