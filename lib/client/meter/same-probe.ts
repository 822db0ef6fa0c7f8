import type { Circuit } from '@/diagrams/document/circuit-schema'
import { conditionKey } from '@/diagrams/document/condition'
import type { Probe } from '@/diagrams/document/reading-schema'

/** True when both measure the same thing in the same condition. */
export function sameProbe(circuit: Circuit, one: Probe | null, other: Probe | null): boolean {
  if (!one || !other || one.kind !== other.kind) return false
  return (
    measured(one) === measured(other) &&
    conditionKey(circuit, one.condition) === conditionKey(circuit, other.condition)
  )
}

function measured(probe: Probe): string {
  switch (probe.kind) {
    case 'volts':
    case 'ohms':
      return `${probe.red} ${probe.black}`
    case 'amps':
      return probe.wire
    case 'works':
      return probe.node
    case 'sees':
      return probe.pin
  }
}
