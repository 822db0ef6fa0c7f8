import type { Probe, Reading, ReadingValue } from '@/diagrams/document/reading-schema'

/** A probe with its value as a reading; null when the value is none that this kind can have. */
export function readingFrom(id: string, probe: Probe, value: ReadingValue): Reading | null {
  const { condition } = probe
  switch (probe.kind) {
    case 'volts':
    case 'ohms':
      if (typeof value !== 'number' && value !== 'OL') return null
      return { id, kind: probe.kind, red: probe.red, black: probe.black, condition, value }
    case 'amps':
      return typeof value === 'number' ? { id, kind: 'amps', wire: probe.wire, condition, value } : null
    case 'works':
      return typeof value === 'boolean' ? { id, kind: 'works', node: probe.node, condition, value } : null
    case 'sees':
      return value === 'high' || value === 'low'
        ? { id, kind: 'sees', pin: probe.pin, condition, value }
        : null
  }
}
