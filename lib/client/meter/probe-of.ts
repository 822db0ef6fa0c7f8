import type { Probe } from '@/diagrams/document/reading-schema'
import type { MeterState } from './meter-state'

/** What the meter is set to measure; null while something is missing. */
export function probeOf(state: MeterState): Probe | null {
  const { kind, condition } = state
  switch (kind) {
    case 'volts':
    case 'ohms':
      return state.red === null ? null : { kind, red: state.red, black: state.black, condition }
    case 'amps':
      return state.wire === null ? null : { kind, wire: state.wire, condition }
    case 'works':
      return state.node === null ? null : { kind, node: state.node, condition }
    case 'sees':
      return state.pin === null ? null : { kind, pin: state.pin, condition }
  }
}
