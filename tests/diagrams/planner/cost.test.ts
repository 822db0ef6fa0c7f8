import { describe, expect, it } from 'vitest'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import { freshWorkplace, minutesFor, workplaceAfter } from '@/diagrams/planner/cost'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples.find((sample) => sample.title === 'Load space lamp request')!
const access = (id: string) => circuit.connectors.find((connector) => connector.id === id)!.accessMinutes
const volts = (red: string, condition: Condition = restCondition): Probe => ({
  kind: 'volts',
  red,
  black: 'chassis',
  condition,
})

describe('minutes of a reading', () => {
  it('are half a minute and the way to a connector not reached before', () => {
    expect(minutesFor(circuit, volts('c12-3.a'), freshWorkplace)).toBeCloseTo(0.5 + access('c12'))
    const there = workplaceAfter(circuit, [volts('c12-3.b')])
    expect(minutesFor(circuit, volts('c12-3.a'), there)).toBeCloseTo(0.5)
  })

  it('count 0.2 for a control moved and 3 for the battery', () => {
    const there = workplaceAfter(circuit, [volts('c12-3.b')])
    const on = { ...restCondition, controls: { key: 'on' } }
    expect(minutesFor(circuit, volts('c12-3.a', on), there)).toBeCloseTo(0.7)
    const dead = { ...restCondition, battery: false }
    expect(
      minutesFor(circuit, { kind: 'ohms', red: 'c12-3.a', black: 'chassis', condition: dead }, there),
    ).toBeCloseTo(3.5)
  })

  it('count 1 and half the access to open a connector, and nothing to leave it open', () => {
    const open = { ...restCondition, unplugged: ['c12'] }
    const there = workplaceAfter(circuit, [volts('c12-3.b')])
    expect(minutesFor(circuit, volts('c12-3.a', open), there)).toBeCloseTo(0.5 + 1 + access('c12') / 2)
    const opened = workplaceAfter(circuit, [volts('c12-3.b', open)])
    expect(minutesFor(circuit, volts('c12-3.a', open), opened)).toBeCloseTo(0.5)
  })

  it('need no way to see whether a load works', () => {
    const lamps = samples.find((sample) => sample.title.startsWith('Trailer'))!
    const load = lamps.nodes.find((node) => node.kind === 'load')!
    expect(
      minutesFor(lamps, { kind: 'works', node: load.id, condition: restCondition }, freshWorkplace),
    ).toBeCloseTo(0.5)
  })
})
