import { describe, expect, it } from 'vitest'
import { sitesOf } from '@/diagrams/document/sites'
import { clearances } from '@/diagrams/faults/clearance'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { samples } from '@/diagrams/samples/all-samples'
import { readFaulty, readingPool } from '@/tests/support/clearance-run'
import { findCounterexample } from '@/tests/support/find-counterexample'
import { seededRandom } from '@/tests/support/random'

const runs = 6

describe('places proved good, searched for a fault that fits after all by a solver of another make', () => {
  it('hold none, while the same search finds one of the true place', () => {
    let searched = 0
    let trueFound = 0
    for (let run = 0; run < runs; run++) {
      const random = seededRandom(9000 + run)
      const circuit = samples[run % 3]!
      const model = faultModelOf(circuit)
      const sites = sitesOf(circuit)
      const site = random.pick(sites)
      const drawn = readFaulty(model.only(site.id), site, readingPool(circuit), 9000 + run)
      if (!drawn) continue
      const { readings } = drawn
      if (findCounterexample(circuit, site, readings, random)) trueFound++
      const judged = clearances(
        model,
        weighReadings(model, readings),
        readings,
        sites.map(({ id }) => id),
      )
      const cleared = sites.filter(({ id }) => judged.get(id)!.cleared)
      for (let i = 0; i < 3 && cleared.length > 0; i++) {
        const [one] = cleared.splice(random.whole(0, cleared.length - 1), 1)
        searched++
        expect(findCounterexample(circuit, one!, readings, random), `run ${run}, ${one!.id}`).toBeNull()
      }
    }
    expect(searched).toBeGreaterThan(10)
    expect(trueFound).toBeGreaterThanOrEqual(runs - 1)
  }, 120_000)
})
