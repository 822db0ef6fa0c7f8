import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { clearances } from '@/diagrams/faults/clearance'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { samples } from '@/diagrams/samples/all-samples'
import { perturbCircuit } from '../../support/perturbed-circuit'
import { plantFault } from '../../support/plant-fault'
import { seededRandom } from '../../support/random'
import { randomCircuit } from '../../support/random-circuit'
import { shows, takeReading } from '../../support/take-reading'

const rounds = Number(process.env.CLEARANCE_ROUNDS ?? 1)
const readingsPerRun = 6

/** Counts runs in which the true site was called proved good, over every site and mode of a circuit. */
function wronglyCleared(circuit: Circuit, seed: number, corners: boolean): { runs: number; wrong: string[] } {
  const random = seededRandom(seed).next
  const wrong: string[] = []
  let runs = 0
  const sites = sitesOf(circuit)
  const model = faultModelOf(circuit)
  for (const site of sites) {
    const suspected = model.only(site.id)
    for (let round = 0; round < rounds; round++)
      for (const mode of site.modes) {
        const fault = plantFault(circuit, site.id, mode, random)
        const vehicle = perturbCircuit(circuit, 11.8 + random(), random, corners)
        // It has to show as drawn and on this vehicle: one that only tips a fuse already at its limit may not.
        if (!shows(circuit, fault) || !shows(vehicle, fault)) continue
        const sets = candidateReadings(
          circuit,
          [site.id, sites[Math.floor(random() * sites.length)]!.id],
          restCondition,
        )
        const readings: Reading[] = []
        for (let i = 0; i < readingsPerRun * 3 && readings.length < readingsPerRun; i++) {
          const set = sets[Math.floor(random() * sets.length)]!
          const probe = set.probes[Math.floor(random() * set.probes.length)]!
          const reading = takeReading(`r${i}`, vehicle, probe, fault, random)
          if (reading) readings.push(reading)
        }
        runs++
        const cleared = clearances(suspected, weighReadings(suspected, readings), readings, [site.id]).get(
          site.id,
        )!
        if (cleared.cleared)
          wrong.push(
            `${JSON.stringify(fault)} by ${cleared.clearedBy.map((id) => JSON.stringify(readings.find((r) => r.id === id))).join(' ')}`,
          )
      }
  }
  return { runs, wrong }
}

describe('the one rule: proved good', () => {
  it('never clears the true place of a random harness either', () => {
    const found = Array.from({ length: 6 * rounds }, (_, i) =>
      wronglyCleared(randomCircuit(4000 + i, 3), 300 + i, i % 2 === 1),
    )
    const runs = found.reduce((sum, each) => sum + each.runs, 0)
    const wrong = found.flatMap((each) => each.wrong)
    console.log(`random harnesses: wrongly cleared ${wrong.length} of ${runs}`)
    expect(runs).toBeGreaterThan(300)
    expect(wrong).toEqual([])
  }, 240_000)

  for (const [index, circuit] of samples.entries())
    it(`never clears the true place of ${circuit.title}, whatever legal readings are taken inside their limits`, () => {
      const even = wronglyCleared(circuit, 100 + index, false)
      const corners = wronglyCleared(circuit, 200 + index, true)
      console.log(
        `${circuit.title}: wrongly cleared ${even.wrong.length + corners.wrong.length} of ${even.runs + corners.runs}`,
      )
      expect(even.runs).toBeGreaterThan(20)
      expect([...even.wrong, ...corners.wrong]).toEqual([])
    }, 120_000)
})
