import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { keyOn, lampLine } from '../../support/lamp-line'
import { madeCircuit, onOff, whenOn } from '../../support/made-circuit'

const circuit = lampLine()
const condition = { ...restCondition, ...keyOn }
const volts = (values: number[]): Reading[] =>
  values.map((value, i) => ({
    id: `r${i}`,
    kind: 'volts',
    red: 'lamp.a',
    black: 'chassis',
    value,
    condition,
    moved: false,
  })) as Reading[]
const works = (values: boolean[]): Reading[] =>
  values.map((value, i) => ({ id: `r${i}`, kind: 'works', node: 'lamp', value, condition })) as Reading[]
const judge = (readings: Reading[]) => evaluate({ circuit, readings, codes: [], priors: 'trade' })

describe('readings of one thing in one condition that exclude each other', () => {
  it('cannot be, however often they are taken, and are never two faults', () => {
    for (const values of [
      [0, 12.5],
      [0, 12.5, 0, 12.5],
      [0, 0, 6, 6, 12, 12],
      Array.from({ length: 24 }, (_, i) => (i % 2) * 12.5),
    ]) {
      const answer = judge(volts(values))
      expect(answer.outcome).toBe('cannot-be')
      expect(answer.reading).toBeDefined()
      expect(answer.sites.every(({ verdict }) => verdict === 'in-question')).toBe(true)
    }
  }, 60_000)

  it('cannot be, also where a load both works and does not', () => {
    expect(judge(works([true, false])).outcome).toBe('cannot-be')
    expect(judge(works(Array.from({ length: 20 }, (_, i) => i % 2 === 0))).outcome).toBe('cannot-be')
    expect(judge(works([true, true])).outcome).not.toBe('cannot-be')
  }, 60_000)

  it('may stand together while their limits overlap', () => {
    expect(judge(volts([12.4, 12.45])).outcome).not.toBe('cannot-be')
  })
})

describe('what cannot be read', () => {
  it('is the report of a module at a side of its plug', () => {
    const module = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        {
          id: 'm',
          kind: 'module',
          connector: 'c',
          pins: [
            { pin: '1', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
            { pin: '2', circuit: { type: 'ground' } },
          ],
        },
        { id: 'g', kind: 'ground' },
      ],
      ['m.1 > g.in', 'm.2 > g.in'],
      { connectors: [{ id: 'c' }] },
    )
    const sees = { id: 'r1', kind: 'sees', pin: 'm.1:part', value: 'low' }
    const opened = openEvaluationRequest({ circuit: module, readings: [sees] })
    expect(opened.ok ? '' : opened.problems[0]!.message).toBe(
      '"m.1:part" is a side of a plug, expected a pin such as m.1',
    )
  })

  it('is not offered: nothing in a position in which the good circuit keeps switching itself', () => {
    const buzzer = madeCircuit(
      [
        { id: 'b', kind: 'battery' },
        { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'a', b: 'b', closed: whenOn('s') }] },
        { id: 'k', kind: 'relay' },
        { id: 'l', kind: 'load', ohms: 6 },
        { id: 'g', kind: 'ground' },
      ],
      ['b.pos > sw.a', 'sw.b > k.30', 'k.87a > k.86', 'k.85 > g.in', 'b.pos > l.a', 'l.b > g.in'],
      { controls: [onOff('s')] },
    )
    const answer = evaluate({ circuit: buzzer, readings: [], codes: [], priors: 'trade' })
    expect(answer.next.length).toBeGreaterThan(0)
    for (const { bits: _b, minutes: _m, outcomes: _o, says: _s, ...probe } of answer.next)
      expect(refuseReading(buzzer, probe as Parameters<typeof refuseReading>[1])).toBeNull()
  }, 60_000)
})
