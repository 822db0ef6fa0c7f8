import type { Circuit } from '../../document/circuit-schema'
import { controlCombinations } from '../../document/condition'
import { restCondition, type Condition } from '../../document/condition-schema'
import { solveOperatingPoint } from '../../solver/operating-point'

const combinationLimit = 8

const known = new WeakMap<Circuit, Condition[]>()

/** Conditions with everything plugged in, the one in which the circuit does most first: where a person starts to measure. */
export function usingConditions(circuit: Circuit): Condition[] {
  let found = known.get(circuit)
  if (!found) {
    found = controlCombinations(circuit, combinationLimit)
      .map((controls): Condition => ({ ...restCondition, controls }))
      .flatMap((condition) => {
        const solved = solveOperatingPoint(circuit, condition)
        if (!solved.ok) return []
        let amps = 0
        for (const each of solved.value.wireAmps.values()) amps += Math.abs(each)
        return [{ condition, amps }]
      })
      .toSorted((a, b) => b.amps - a.amps)
      .map(({ condition }) => condition)
    known.set(circuit, found)
  }
  return found
}
