import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { samples } from '@/diagrams/samples/all-samples'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { perturbCircuit } from '../../support/perturbed-circuit'
import { plantFault } from '../../support/plant-fault'
import { seededRandom } from '../../support/random'
import { shows } from '../../support/take-reading'
import { traceFault } from '../../support/trace-fault'

describe('the planner', () => {
  it('thinks only of readings that can be taken', () => {
    for (const circuit of samples) {
      const suspects = sitesOf(circuit).map((site) => site.id)
      for (const set of candidateReadings(circuit, suspects, restCondition))
        for (const probe of set.probes)
          expect(refuseReading(circuit, probe), JSON.stringify(probe)).toBeNull()
    }
  })

  it('leads to the true place on real vehicles: parts and battery off the drawing, meter errors inside their limits', () => {
    const random = seededRandom(71).next
    const missed: string[] = []
    let runs = 0
    for (const circuit of samples)
      for (let i = 0; i < 3; ) {
        const sites = sitesOf(circuit)
        const site = sites[Math.floor(random() * sites.length)]!
        const fault = plantFault(
          circuit,
          site.id,
          site.modes[Math.floor(random() * site.modes.length)]!,
          random,
        )
        if (!shows(circuit, fault)) continue
        i++
        runs++
        const run = traceFault(circuit, perturbCircuit(circuit, 11.8 + random(), random), fault, random, 16)
        const faulty = run.answer.sites.filter((s) => s.verdict === 'faulty').map((s) => s.site)
        const wire = fault.other === undefined ? '' : `wire:${fault.other}`
        if (!faulty.includes(fault.site) && !faulty.includes(wire))
          missed.push(
            `${circuit.title}: ${JSON.stringify(fault)} → ${run.answer.outcome}, ${run.answer.says}`,
          )
      }
    console.log(`located ${runs - missed.length} of ${runs}`)
    for (const miss of missed) console.log(miss)
    // One in ten may end elsewhere: 0.95 is asked of an answer, and a fault that hardly shows may pass for none.
    expect(missed.length).toBeLessThanOrEqual(Math.floor(runs / 10))
  }, 600_000)

  it('never asks for the same reading twice', () => {
    const circuit = samples[0]!
    const run = traceFault(
      circuit,
      circuit,
      { site: 'contact:body.5', mode: 'resistive', ohms: 3000 },
      seededRandom(3).next,
      12,
    )
    const asked = run.readings.map(({ id: _, value: __, ...probe }) => JSON.stringify(probe))
    expect(new Set(asked).size).toBe(asked.length)
  })
})
