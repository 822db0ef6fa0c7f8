import type { Circuit, ControlsSetting } from '../document/circuit-schema'
import { controlCombinations } from '../document/condition'
import { restCondition, type Condition } from '../document/condition-schema'

export interface NamedCondition {
  name: string
  condition: Condition
}

/** A circuit with ten switches has a thousand combinations: past this many, the rest are left out and counted. */
export const mostCombinations = 256

/** Every combination of controls with the battery connected, then the battery off; and how many combinations are left out. */
export function namedConditions(circuit: Circuit): { conditions: NamedCondition[]; leftOut: number } {
  const all = circuit.controls.reduce((product, control) => product * new Set(control.positions).size, 1)
  const combinations = controlCombinations(circuit, mostCombinations)
  return {
    conditions: [
      ...combinations.map((controls) => ({
        name: settingName(circuit, controls),
        condition: { ...restCondition, controls },
      })),
      { name: 'battery disconnected', condition: { ...restCondition, battery: false } },
    ],
    leftOut: Math.max(0, all - combinations.length),
  }
}

/** "Key on, SW5 held"; what is at rest is not said. */
function settingName(circuit: Circuit, setting: ControlsSetting): string {
  const moved = circuit.controls.filter((control) => setting[control.id] !== control.rest)
  return (
    moved.map((control) => `${control.label || control.id} ${setting[control.id]}`).join(', ') ||
    'everything at rest'
  )
}
