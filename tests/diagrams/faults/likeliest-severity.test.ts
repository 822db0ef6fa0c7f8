import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { keyOn, lampLine } from '../../support/lamp-line'

const condition = { ...restCondition, ...keyOn }
const circuit = lampLine()

function read(fault: PlantedFault): Reading[] {
  const probes = [
    { kind: 'volts', red: 'g1.in', black: 'chassis', condition },
    { kind: 'volts', red: 'lamp.b', black: 'chassis', condition },
    { kind: 'amps', wire: 'w6', condition },
  ] as const
  return probes.map((probe, i) => {
    const shown = measure(circuit, probe, fault)
    if (!shown.ok) throw new Error(shown.problem.message)
    return { ...probe, id: `r${i}`, value: shown.value } as Reading
  })
}

describe('the likeliest severity', () => {
  it('is that of the fault, nearer than a twelfth, where readings under load pin it down', () => {
    for (const ohms of [0.8, 1.8, 2.5, 4.4, 7]) {
      const readings = read({ site: 'part:g1', mode: 'resistive', ohms })
      const { sites } = evaluate({ circuit, readings, codes: [], priors: 'trade' })
      const [mode] = sites.find(({ site }) => site === 'part:g1')!.modes
      expect(mode!.mode).toBe('resistive')
      expect(Math.abs(mode!.ohms! / ohms - 1), `${ohms} ohm, said ${mode!.ohms}`).toBeLessThan(1 / 12)
    }
  }, 60_000)
})
