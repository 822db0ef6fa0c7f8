import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { restCondition } from '../document/condition-schema'
import type { Probe } from '../document/reading-schema'
import { effortOf, minutesOf, standingIn } from './effort'

/** Where the person stands: the condition of the vehicle and what is laid open already. */
export interface Workplace {
  condition: Condition
  reached: ReadonlySet<string>
}

export const freshWorkplace: Workplace = { condition: restCondition, reached: new Set() }

/** The workplace after these readings. */
export function workplaceAfter(circuit: Circuit, probes: readonly Probe[]): Workplace {
  const reached = new Set(probes.flatMap((probe) => effortOf(circuit, probe).reaches))
  return { condition: probes.at(-1)?.condition ?? restCondition, reached }
}

/** Minutes to take one reading from where one stands. */
export function minutesFor(circuit: Circuit, probe: Probe, workplace: Workplace): number {
  return minutesOf(effortOf(circuit, probe), standingIn(circuit, workplace.condition), workplace.reached)
}
