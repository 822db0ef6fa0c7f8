import { expect, it } from 'vitest'
import { madeCircuit, operate } from '@/tests/support/made-circuit'

it('puts a battery whose ground strap is open midway, not off by the rounding of its short-circuit current', () => {
  // 12.6 V behind 5 mohm is 2,520 A as a Norton source; 1e-16 of that over the few leaks of this
  // harness would be millivolts. Six like unknowns on either side: half the volts each.
  const circuit = madeCircuit(
    [
      { id: 'bat', kind: 'battery', ohms: 0.005 },
      { id: 'p', kind: 'splice' },
      { id: 'n', kind: 'splice' },
    ],
    ['bat.pos > p.s', 'bat.neg > n.s'],
  )
  const { volts } = operate(circuit)
  expect(volts.get('bat.pos')).toBeCloseTo(6.3, 7)
  expect(volts.get('bat.neg')).toBeCloseTo(-6.3, 7)
  expect(volts.get('p.s')).toBeCloseTo(6.3, 7)
})
