import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition } from '@/diagrams/document/condition-schema'
import { noAlteration } from '@/diagrams/solver/alteration'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { batteryVoltsAt, Case, fixedVoltsAt, theveninOhms } from '@/diagrams/solver/case'
import { PortSweep } from '@/diagrams/solver/port-sweep'
import { Study } from '@/diagrams/solver/study'
import { seededRandom } from '@/tests/support/random'
import { randomCircuit } from '@/tests/support/random-circuit'

const severities = Float64Array.of(0.01, 0.5, 20, 4_700, 1e6, 1e10)
const swept = () => ({
  voltsBattery: new Float64Array(severities.length),
  voltsFixed: new Float64Array(severities.length),
  ohms: new Float64Array(severities.length),
})

describe('a sweep of a fault at one pair of leads', () => {
  it('shows what the same fault shows when it is solved whole, in series and across', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 100_000 }), fc.boolean(), (seed, battery) => {
        const random = seededRandom(seed)
        const circuit = randomCircuit(seed, 3)
        const network = buildNetwork(circuit)
        const controls = random.pick(controlCombinations(circuit, 20))
        const study = new Study(network, { ...restCondition, controls, battery })
        const good = new Case(study, noAlteration).settle(0)
        if (!good) return
        const { base } = good.located
        const [a, b] = [random.whole(0, network.size - 1), random.whole(-1, network.size - 1)]
        const sweep = new PortSweep(base, a, b)
        const conducting = network.branches.flatMap((_, i) => (base.conductance[i]! > 0 ? [i] : []))
        const branch = random.pick(conducting)
        const shunt = [random.whole(0, network.size - 1), random.whole(-1, network.size - 1)] as const
        for (const alteration of [
          { ...noAlteration, series: [branch] },
          { ...noAlteration, shunt },
        ]) {
          const into = swept()
          if (alteration.series.length > 0) sweep.series(branch, severities, into)
          else sweep.across(...shunt, severities, into)
          const given = new Case(study, alteration)
          severities.forEach((severity, i) => {
            const settled = given.solve(good.states, severity, 1)
            const volts = batteryVoltsAt(settled, a) - batteryVoltsAt(settled, b)
            const fixed = fixedVoltsAt(settled, a) - fixedVoltsAt(settled, b)
            const ohms = theveninOhms(settled, a, b)
            expect(Math.abs(into.voltsBattery[i]! - volts)).toBeLessThan(1e-6)
            expect(Math.abs(into.voltsFixed[i]! - fixed)).toBeLessThan(1e-6)
            // What floats is gigohms either way, beyond any meter.
            if (ohms < 4e7) expect(Math.abs(into.ohms[i]! - ohms)).toBeLessThan(1e-4 + 1e-6 * ohms)
            else expect(into.ohms[i]).toBeGreaterThan(3.9e7)
          })
        }
      }),
      { numRuns: 150, seed: 20_261_201 },
    )
  })
})
