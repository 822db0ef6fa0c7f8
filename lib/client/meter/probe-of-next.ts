import type { Probe } from '@/diagrams/document/reading-schema'
import type { NextReading } from '@/diagrams/faults/answer'

/** Null for a reading that does not say what it measures. */
export function probeOfNext(next: NextReading): Probe | null {
  const { condition } = next
  switch (next.kind) {
    case 'volts':
    case 'ohms':
      return next.red && next.black ? { kind: next.kind, red: next.red, black: next.black, condition } : null
    case 'amps':
      return next.wire ? { kind: 'amps', wire: next.wire, condition } : null
    case 'works':
      return next.node ? { kind: 'works', node: next.node, condition } : null
    case 'sees':
      return next.pin ? { kind: 'sees', pin: next.pin, condition } : null
  }
}
