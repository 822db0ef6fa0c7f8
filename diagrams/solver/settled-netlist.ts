import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import type { Case, Settled } from './case'
import { leakSiemens } from './constants'
import { openCase } from './faulted-case'
import { unstable } from './operating-point'
import type { PlantedFault } from './planted-fault'

/** A resistance with a source in series: volts(a) − volts(b) = volts + ohms · amperes from a to b. */
export interface LinearElement {
  name: string
  /** Nets of its ends; 0 is chassis. */
  a: number
  b: number
  ohms: number
  volts: number
}

/** A circuit at rest, as any circuit simulator would take it: resistances and sources, nothing else. */
export interface SettledNetlist {
  /** Nets are numbered 0 (chassis) to `nets` − 1. */
  nets: number
  elements: LinearElement[]
  netOf: ReadonlyMap<string, number>
}

/** The linear elements of a circuit in a condition, with a fault if one is given. */
export function settledNetlist(
  circuit: Circuit,
  condition: Condition,
  fault?: PlantedFault,
): { ok: true; value: SettledNetlist } | { ok: false; problem: Problem } {
  const opened = openCase(circuit, condition, fault)
  if (!opened.ok) return opened
  const { given, severity } = opened.value
  const settled = given.settle(severity)
  return settled ? { ok: true, value: netlistOf(given, settled) } : { ok: false, problem: unstable }
}

/** The same of a network that has been settled already. Branches that do not conduct are left out. */
export function netlistOf(given: Case, settled: Settled): SettledNetlist {
  const { network } = given.study
  const { base, branch: altered, p, q, touches } = settled.located
  const elements: LinearElement[] = []
  network.branches.forEach((branch, i) => {
    const siemens = base.conductance[i]!
    if (siemens === 0) return
    elements.push({
      name: branch.name,
      a: branch.a + 1,
      b: branch.b + 1,
      ohms: 1 / siemens + (i === altered ? settled.severity : 0),
      volts: settled.scale * base.emfBattery[i]! + base.emfFixed[i]!,
    })
  })
  if (altered < 0 && touches)
    elements.push({ name: 'short', a: p + 1, b: q + 1, ohms: settled.severity, volts: 0 })
  for (let unknown = 0; unknown < network.leaking; unknown++)
    elements.push({ name: `leak:${unknown}`, a: unknown + 1, b: 0, ohms: 1 / leakSiemens, volts: 0 })
  return {
    nets: network.size + 1,
    elements,
    netOf: new Map([...network.unknownOf].map(([point, unknown]) => [point, unknown + 1])),
  }
}
