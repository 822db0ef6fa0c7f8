import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition } from '@/diagrams/document/condition-schema'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { netOf } from './plain-reading'
import { settlePlainly } from './plain-solver'
import { seededRandom } from './random'
import { randomCircuit } from './random-circuit'
import { randomFault } from './random-fault'

const asDrawn = { part: () => 1, battery: 1 }

describe('the plain solver, written from the page alone', () => {
  it('finds the same volts and states as the solver on 60 random harnesses with a fault', () => {
    let [worst, compared] = [0, 0]
    for (let seed = 6001; seed <= 6060; seed++) {
      const random = seededRandom(seed)
      const circuit = randomCircuit(seed, 2)
      const condition = { ...restCondition, controls: random.pick(controlCombinations(circuit, 50)) }
      const fault = randomFault(circuit, random)
      const theirs = solveOperatingPoint(circuit, condition, fault)
      const blown = new Set(theirs.ok ? theirs.value.blown : [])
      const ours = settlePlainly(circuit, condition, asDrawn, blown, fault)
      if (!theirs.ok) continue
      expect(ours, `${seed} ${JSON.stringify(fault)}`).not.toBeNull()
      compared++
      for (const [point, volts] of theirs.value.volts)
        worst = Math.max(worst, Math.abs(volts - ours!.volts(netOf(circuit, point))))
      expect([...ours!.states.modules].toSorted()).toEqual(
        [...theirs.value.modules]
          .filter(([, awake]) => awake)
          .map(([id]) => id)
          .toSorted(),
      )
    }
    console.log(`plain solver: ${compared} harnesses, worst ${worst.toExponential(1)} V`)
    expect(compared).toBeGreaterThan(50)
    expect(worst).toBeLessThan(2e-3)
  }, 60_000)
})
