import { controlCombinations } from '@/diagrams/document/condition'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { ampsOf, netOf } from './plain-reading'
import { inside, innerGround, settlePlainly, type Factors, type Solved } from './plain-solver'

const driving = (circuit: Circuit): Condition[] =>
  controlCombinations(circuit, 64).map((controls) => ({ ...restCondition, controls }))

/** Fuses that a short has blown, most overloaded first, in any combination of controls; passing states are not looked at. */
export function blownPlainly(circuit: Circuit, factors: Factors, fault: PlantedFault): ReadonlySet<string> {
  const blown = new Set<string>()
  if (!fault.mode.startsWith('short')) return blown
  for (;;) {
    let [worst, which] = [1.35, '']
    for (const condition of driving(circuit)) {
      const solved = settlePlainly(circuit, condition, factors, blown, fault)
      if (!solved) continue
      for (const node of circuit.nodes) {
        if (node.kind !== 'fuse' || blown.has(node.id)) continue
        const times = Math.abs(ampsOf(solved, `part:${node.id}`)) / node.amps
        if (times > worst) [worst, which] = [times, node.id]
      }
    }
    if (which === '') return blown
    blown.add(which)
  }
}

/** The page's rule on this vehicle: a point moved by over 0.4 V, or a load or an input changed. */
export function showsPlainly(
  circuit: Circuit,
  factors: Factors,
  blown: ReadonlySet<string>,
  fault: PlantedFault,
): boolean {
  return driving(circuit).some((condition) => {
    const good = settlePlainly(circuit, condition, factors, new Set())
    if (!good) return false
    const bad = settlePlainly(circuit, condition, factors, blown, fault)
    if (!bad) return true
    const points = new Set(
      circuit.wires.flatMap((wire) => [netOf(circuit, wire.from), netOf(circuit, wire.to)]),
    )
    for (const net of points) if (Math.abs(good.volts(net) - bad.volts(net)) > 0.4) return true
    return circuit.nodes.some((node) => {
      if (node.kind === 'load') {
        const works = (solved: Solved, at?: PlantedFault) => {
          const mine = at?.site === `part:${node.id}` ? at : undefined
          if (mine && mine.mode !== 'resistive') return false
          const element = solved.elements.find((e) => e.name === `part:${node.id}`)!
          const own = (element.ohms - (mine?.ohms ?? 0)) / element.ohms
          const over = solved.volts(inside(node, 'a')) - solved.volts(inside(node, 'b'))
          return Math.abs(over) * own >= 12 * node.worksFrom
        }
        return works(good) !== works(bad, fault)
      }
      return (
        node.kind === 'module' &&
        node.pins.some(({ pin, circuit: inner, threshold }) => {
          if (inner.type !== 'pull-up' && inner.type !== 'pull-down') return false
          const limit = threshold ?? (inner.type === 'pull-up' ? inner.volts / 2 : 6)
          const high = (solved: Solved) =>
            solved.volts(`I:${node.id}.${pin}`) - solved.volts(innerGround(node)) >= limit
          return high(good) !== high(bad)
        })
      )
    })
  })
}
