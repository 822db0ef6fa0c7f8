import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import { figureOf, type Reading } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import { samples } from '@/diagrams/samples/all-samples'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { perturbCircuit } from '../../support/perturbed-circuit'
import { plantFault } from '../../support/plant-fault'
import { seededRandom } from '../../support/random'
import { shows, takeReading } from '../../support/take-reading'
import { probeOf } from '../../support/trace-fault'

const most = 12

/** Takes what the planner asks for while moving the harness, the fault coming and going under one's hands. */
function traceMoved(circuit: Circuit, vehicle: Circuit, fault: PlantedFault, random: () => number) {
  const readings: Reading[] = []
  for (;;) {
    const answer = evaluate({ circuit, readings, codes: [], priors: 'trade' })
    const next = answer.outcome === 'narrowed' && readings.length < most ? answer.next[0] : undefined
    if (!next) return { answer, readings }
    const probe = probeOf(next)
    const id = `r${readings.length + 1}`
    const without = takeReading(id, vehicle, probe, undefined, () => 0.5)!
    const within = takeReading(id, vehicle, probe, fault, () => 0.5)!
    const rest = random() < 0.5 ? without : within
    if (rest.kind === 'works' || rest.kind === 'sees') {
      readings.push(rest)
      continue
    }
    const figures = [without.value, within.value] as (number | 'OL')[]
    const [low, high] = figures.toSorted((a, b) => figureOf(a) - figureOf(b))
    readings.push({ ...rest, moved: true, low: low!, high: high! })
  }
}

describe('a fault that comes and goes while the harness is moved', () => {
  for (const title of ['Load space lamp request', 'Tailgate release button'])
    it(`is located by the readings the planner asks for: ${title}`, () => {
      const circuit = samples.find((sample) => sample.title === title)!
      const random = seededRandom(40).next
      const lengths: number[] = []
      let located = 0
      for (const site of sitesOf(circuit).filter((_, i) => i % 4 === 0)) {
        const fault = plantFault(circuit, site.id, site.modes[0]!, random)
        const vehicle = perturbCircuit(circuit, 11.8 + random(), random)
        if (!shows(circuit, fault) || !shows(vehicle, fault)) continue
        // What has blown its fuse does not go again.
        const operated = solveOperatingPoint(vehicle, restCondition, fault)
        if (operated.ok && operated.value.blown.length > 0) continue
        const { answer, readings } = traceMoved(circuit, vehicle, fault, random)
        const own = answer.sites.find((each) => each.site === site.id)!
        expect(answer.outcome, site.id).not.toBe('cannot-be')
        expect(own.verdict, site.id).not.toBe('proved-good')
        if (answer.outcome === 'located') {
          expect(own.verdict, site.id).toBe('faulty')
          expect(answer.comesAndGoes).toBe(true)
          located++
        }
        lengths.push(readings.length)
      }
      const mean = lengths.reduce((sum, length) => sum + length, 0) / lengths.length
      console.log(`${title}: ${located} of ${lengths.length} located, ${mean.toFixed(1)} readings`)
      expect(lengths.length).toBeGreaterThan(4)
      expect(located / lengths.length).toBeGreaterThan(0.75)
    }, 240_000)
})
