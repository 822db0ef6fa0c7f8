import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { readingsBetween } from '@/diagrams/between'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { samples } from '@/diagrams/samples/all-samples'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { madeCircuit } from '../../support/made-circuit'
import { probeOf } from '../../support/trace-fault'

const lamp = samples.find((sample) => sample.title === 'Load space lamp request')!
const fan = samples.find((sample) => sample.title.startsWith('Two-speed'))!

function between(circuit: Circuit, sites: string[], readings: unknown[] = []) {
  const opened = openEvaluationRequest({ circuit, readings })
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
  return readingsBetween(opened.value, sites)
}
function found(circuit: Circuit, sites: string[], readings: unknown[] = []) {
  const result = between(circuit, sites, readings)
  if (!result.ok) throw new Error(result.problem.message)
  return result.value
}

describe('what would settle between two places', () => {
  it('is a reading that shows one thing for the one and another for the other', () => {
    const sites = ['contact:c12-3', 'wire:w6']
    const { readings } = found(lamp, sites)
    expect(readings.length).toBeGreaterThan(0)
    const probe = probeOf(readings[0]!)
    expect(refuseReading(lamp, probe)).toBeNull()
    const shown = sites.map((site): unknown => {
      const fault: PlantedFault = { site, mode: 'open' }
      const measured = measure(lamp, probe, fault)
      if (!measured.ok) throw new Error(measured.problem.message)
      return typeof measured.value === 'number' ? Math.round(measured.value) : measured.value
    })
    expect(shown[0]).not.toEqual(shown[1])
  })

  it('weighs the two as equals and leaves only them, best bits per minute first', () => {
    const { readings } = found(lamp, ['wire:w5', 'wire:w6'])
    const rates = readings.map(({ bits, minutes }) => bits / minutes)
    expect(rates).toEqual(rates.toSorted((a, b) => b - a))
    for (const { bits, outcomes } of readings) {
      expect(bits).toBeLessThanOrEqual(1 + 1e-9)
      for (const { leaves } of outcomes)
        for (const site of leaves) expect(['wire:w5', 'wire:w6']).toContain(site)
    }
  })

  it('says so where nothing tells them apart, and that one repair covers both', () => {
    // The coil is alone between its two contacts: from outside they are one resistance.
    const value = found(fan, ['contact:k1.85', 'contact:k1.86'])
    expect(value.readings).toEqual([])
    expect(value.says).toBe(
      'No reading tells contact at K1 fan slow 85 and contact at K1 fan slow 86 apart, whatever is opened, pulled or put in. Mend both in one repair, then prove it.',
    )
  })

  it('settles between the coil and the contact of one relay', () => {
    // Either leaves the fan still; ohms over the coil tell.
    const value = found(fan, ['part:k1.coil', 'part:k1.contact'])
    expect(value.readings.length).toBeGreaterThan(0)
    expect(value.says).toContain('Between K1 fan slow coil and K1 fan slow contact: ')
  })

  it('never asks for a reading that was taken', () => {
    const first = found(lamp, ['wire:w5', 'wire:w6']).readings[0]!
    const reading = { id: 'r1', ...probeOf(first), value: first.kind === 'ohms' ? 'OL' : 12.6 }
    const after = found(lamp, ['wire:w5', 'wire:w6'], [reading]).readings
    expect(after.map((next) => JSON.stringify(probeOf(next)))).not.toContain(JSON.stringify(probeOf(first)))
  })

  it('names a place that does not exist, and asks for two different ones', () => {
    expect(between(lamp, ['wire:w5', 'wire:zz'])).toEqual({
      ok: false,
      problem: { path: 'sites.1', message: 'place "wire:zz" does not exist' },
    })
    const same = between(lamp, ['wire:w5', 'wire:w5'])
    expect(same.ok ? '' : same.problem.message).toContain('expected two or more different ones')
  })

  it('says that a place which cannot show needs no settling', () => {
    const idle = madeCircuit(
      [
        { id: 'bat', kind: 'battery', x: 0, y: 0 },
        { id: 'l', kind: 'load', label: 'Lamp', ohms: 10, x: 0, y: 0 },
        { id: 'g', kind: 'ground', x: 0, y: 0 },
        { id: 'loose', kind: 'splice', label: 'S9', x: 0, y: 0 },
        { id: 'end', kind: 'splice', label: 'S10', x: 0, y: 0 },
      ],
      ['bat.pos > l.a', 'l.b > g.in', 'loose.s > end.s'],
    )
    const value = found(idle, ['wire:w1', 'part:loose'])
    expect(value.readings).toEqual([])
    expect(value.says).toContain('S9 cannot be at fault in a way that shows')
  })
})
