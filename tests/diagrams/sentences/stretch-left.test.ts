import { describe, expect, it } from 'vitest'
import { stretchLeft } from '@/diagrams/faults/stretch-left'
import { lampLine } from '@/tests/support/lamp-line'
import { madeCircuit } from '@/tests/support/made-circuit'

const between = (...left: string[]) => stretchLeft(lampLine(), new Set(left))

describe('places left that hang together', () => {
  it('lie between the two points where they touch the rest', () => {
    expect(between('wire:w3', 'contact:c1-1', 'wire:w4')?.toSorted()).toEqual(['key.out', 'lamp.a'])
    expect(between('contact:lamp.b', 'wire:w5')?.toSorted()).toEqual(['c1-2.b', 'lamp.b:part'])
  })
  it('reach to chassis where a ground is among them', () => {
    expect(between('wire:w6', 'part:g1')?.toSorted()).toEqual(['c1-2.a', 'chassis'])
  })
  it('end inside a module where pins are among them', () => {
    const circuit = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        {
          id: 'm',
          kind: 'module',
          pins: [
            { pin: '1', circuit: { type: 'supply', ohms: 100 } },
            { pin: '2', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
          ],
        },
        { id: 'r', kind: 'resistor', ohms: 100 },
        { id: 'g', kind: 'ground' },
      ],
      ['bat.pos > m.1', 'm.2 > r.a', 'r.b > g.in'],
    )
    expect(stretchLeft(circuit, new Set(['pin:m.2', 'wire:w2']))?.toSorted()).toEqual(['m', 'r.a'])
  })
})

describe('places left that do not', () => {
  it.each([
    ['two pieces apart', ['wire:w2', 'wire:w3', 'wire:w5', 'wire:w6']],
    ['one place alone', ['wire:w3']],
    [
      'a run that begins at the battery itself',
      ['part:bat', 'wire:w1', 'part:f1', 'wire:w2', 'part:key.x', 'wire:w3'],
    ],
    ['a place that is no stretch', ['wire:w3', 'contact:c1-1', 'module:m']],
  ])('have no two ends: %s', (_, left) => expect(between(...left)).toBeNull())
})
