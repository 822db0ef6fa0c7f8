import { describe, expect, it } from 'vitest'
import { evaluate } from '@/diagrams/evaluate'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { samples } from '@/diagrams/samples/all-samples'

const copy = (index: number) => structuredClone(samples[index]!)

describe('the model of a circuit', () => {
  it('is shared by equal documents and by no others', () => {
    expect(faultModelOf(copy(0))).toBe(faultModelOf(copy(0)))
    const changed = copy(0)
    changed.wires[0]!.length += 0.1
    expect(faultModelOf(changed)).not.toBe(faultModelOf(copy(0)))
  })

  it('gives the same answer again, whatever was asked in between', () => {
    const ask = (index: number) => evaluate({ circuit: copy(index), readings: [], codes: [], priors: 'even' })
    const first = ask(0)
    ask(1)
    expect(ask(0)).toEqual(first)
  })
})
