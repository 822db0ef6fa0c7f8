import { describe, expect, it } from 'vitest'
import { settledNetlist } from '@/diagrams/solver/settled-netlist'
import { inCondition, madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'

const circuit = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }] },
    { id: 'lamp', kind: 'load', ohms: 6, coldOhms: 0.6 },
    { id: 'g', kind: 'ground' },
  ],
  ['bat.pos > sw.in', 'sw.out > lamp.a', 'lamp.b > g.in'],
  { controls: [onOff('key')] },
)

function elements(change: object, fault?: Parameters<typeof settledNetlist>[2]) {
  const made = settledNetlist(circuit, inCondition(change), fault)
  if (!made.ok) throw new Error(made.problem.message)
  return new Map(made.value.elements.map((element) => [element.name, element]))
}

describe('a settled netlist', () => {
  it('holds what conducts in its condition, sources at their volts', () => {
    const off = elements({})
    expect(off.get('part:bat')).toMatchObject({ ohms: 0.02, volts: 12.6, b: 0 })
    expect(off.has('part:sw.x')).toBe(false)
    const charging = elements({ controls: { key: 'on' }, charging: true })
    expect(charging.get('part:bat')?.volts).toBeCloseTo(14.15, 9)
    expect(charging.get('part:sw.x')?.ohms).toBeCloseTo(0.02, 12)
    const dead = elements({ battery: false })
    expect(dead.has('part:bat')).toBe(false)
    expect(dead.get('part:lamp')?.ohms).toBeCloseTo(0.6, 12)
  })
  it('adds a series fault to its element and puts a short in as one of its own', () => {
    const bad = elements({}, { site: 'part:g', mode: 'resistive', ohms: 3 })
    expect(bad.get('part:g')?.ohms).toBeCloseTo(3.002, 12)
    const short = elements({}, { site: 'wire:w1', mode: 'short-to-ground', ohms: 0.5 })
    expect(short.get('short')).toMatchObject({ ohms: 0.5, volts: 0, b: 0 })
  })
  it('leaks 1e-11 siemens at every net but chassis', () => {
    const made = settledNetlist(circuit, inCondition())
    if (!made.ok) throw new Error(made.problem.message)
    const leaks = made.value.elements.filter((element) => element.name.startsWith('leak:'))
    expect(leaks).toHaveLength(made.value.nets - 1)
    expect(leaks.every((leak) => leak.b === 0 && Math.abs(leak.ohms / 1e11 - 1) < 1e-12)).toBe(true)
    expect(made.value.netOf.get('chassis')).toBe(0)
    expect(made.value.netOf.get('bat.neg')).toBe(0)
  })
  it('is refused for a circuit that does not come to rest and for a condition it does not have', () => {
    const chatter = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'k', kind: 'relay' },
        { id: 'g', kind: 'ground' },
      ],
      ['bat.pos > k.30', 'k.87a > k.86', 'k.85 > g.in'],
    )
    expect(settledNetlist(chatter, inCondition())).toMatchObject({ ok: false })
    expect(settledNetlist(circuit, inCondition({ controls: { lid: 'on' } }))).toMatchObject({
      ok: false,
      problem: { path: 'condition.controls.lid' },
    })
  })
})
