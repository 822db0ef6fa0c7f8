import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { branchAmps, coilVolts, elementVolts, voltsAt, voltsBetween, type Case, type Settled } from './case'
import { openCase } from './faulted-case'
import type { PlantedFault } from './planted-fault'

/** A settled circuit: what every point and part does. Volts to chassis with no meter on, amperes. */
export interface OperatingPoint {
  volts: Map<string, number>
  /** Positive from `from` to `to`, at the `from` end. */
  wireAmps: Map<string, number>
  loads: Map<string, { works: boolean; volts: number }>
  /** True for a relay whose coil has pulled in. */
  relays: Map<string, boolean>
  modules: Map<string, boolean>
  /** What each input of a module sees, by `module.pin`. */
  sees: Map<string, 'high' | 'low'>
  /** Fuses the fault has blown. */
  blown: string[]
}

/** Solves a circuit in a condition, with a fault if one is given. A circuit that does not settle is refused as unstable. */
export function solveOperatingPoint(
  circuit: Circuit,
  condition: Condition,
  fault?: PlantedFault,
): { ok: true; value: OperatingPoint } | { ok: false; problem: Problem } {
  const opened = openCase(circuit, condition, fault)
  if (!opened.ok) return opened
  const { given, severity, blown } = opened.value
  const settled = given.settle(severity)
  if (!settled) return { ok: false, problem: unstable }
  const { network } = given.study
  return {
    ok: true,
    value: {
      volts: new Map([...network.unknownOf].map(([point, unknown]) => [point, voltsAt(settled, unknown)])),
      wireAmps: new Map(
        circuit.wires.map((wire) => [
          wire.id,
          branchAmps(given, settled, network.branchIndex.get(`wire:${wire.id}/from`)!),
        ]),
      ),
      loads: new Map(
        network.loads.map((load, i) => [
          load.node,
          { works: loadWorks(given, settled, i), volts: Math.abs(elementVolts(given, settled, load.branch)) },
        ]),
      ),
      relays: new Map(
        network.relays.map((relay, i) => [relay.node, coilVolts(given, settled, i) >= relay.pullIn]),
      ),
      modules: new Map(network.modules.map((module, i) => [module.node, settled.states.modules[i]!])),
      sees: new Map(network.inputs.map((input, i) => [input.point, inputSees(given, settled, i)])),
      blown,
    },
  }
}

export const unstable: Problem = {
  path: 'condition',
  message: 'the circuit does not come to rest in this condition: a relay or module keeps switching itself',
}

/** Does its job: enough volts over its own element. */
export function loadWorks(given: Case, settled: Settled, load: number): boolean {
  const { branch, worksFromVolts, node } = given.study.network.loads[load]!
  return (
    !given.alteration.forced.idle.has(node) &&
    Math.abs(elementVolts(given, settled, branch)) >= worksFromVolts
  )
}

export function inputSees(given: Case, settled: Settled, input: number): 'high' | 'low' {
  const { inner, innerGround, threshold } = given.study.network.inputs[input]!
  return voltsBetween(settled, inner, innerGround) >= threshold ? 'high' : 'low'
}
