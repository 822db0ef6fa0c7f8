import type { Circuit } from '@/diagrams/document/circuit-schema'
import { positionsIn } from '@/diagrams/document/condition'
import type { Condition } from '@/diagrams/document/condition-schema'
import { addedWords } from '@/diagrams/document/condition-words'
import { connectorName, nodeName, pointName } from '@/diagrams/document/points'
import type { Reading, ReadingValue } from '@/diagrams/document/reading-schema'
import { siteName } from '@/diagrams/document/sites'
import type { MeterKind } from './meter-state'

export const kindWords = {
  volts: 'Volts',
  ohms: 'Ohms',
  amps: 'Amps',
  works: 'Works',
  sees: 'Sees',
} as const satisfies Record<MeterKind, string>

export const unitWords = { volts: 'V', ohms: 'ohm', amps: 'A', works: '', sees: '' } as const

/** "12.58 V", "OL", "works", "does not work": a value as it stands in the tray and on a flag. */
export function valueWords(kind: keyof typeof unitWords, value: ReadingValue): string {
  if (value === true) return 'works'
  if (value === false) return 'does not work'
  if (typeof value === 'string') return value
  return `${figure(kind, value)} ${unitWords[kind]}`.trim()
}

/** "moved 0.20 to 12.58": between which figures it went while the harness was moved. */
export function movedWords({ kind, low, high }: Reading): string {
  const [least, most] = [low, high].map((end) => (typeof end === 'number' ? figure(kind, end) : (end ?? '?')))
  return `moved ${least} to ${most}`
}

/** Two decimals under a hundred volts, what matters of ohms: 0.2, 85, 4700. */
function figure(kind: keyof typeof unitWords, value: number): string {
  if (kind === 'ohms') {
    const size = Math.abs(value)
    if (size >= 1_000_000) return `${trim(value / 1_000_000, 2)} M`
    if (size >= 10_000) return `${trim(value / 1000, 2)} k`
    return trim(value, size < 10 ? 2 : size < 100 ? 1 : 0)
  }
  return value.toFixed(Math.abs(value) < 100 ? 2 : 1)
}

function trim(value: number, decimals: number): string {
  return String(Number(value.toFixed(decimals)))
}

/** "Key on, SW5 held, C7 unplugged, battery disconnected": what differs from the vehicle as one finds it. */
export function conditionWords(circuit: Circuit, condition: Condition): string {
  const positions = positionsIn(circuit, condition.controls)
  const words = circuit.controls
    .filter((control) => positions[control.id] !== control.rest)
    .map((control) => `${control.label || control.id} ${positions[control.id]}`)
  const pulled = condition.unplugged.map((id) => unpluggedName(circuit, id))
  if (pulled.length > 0) words.push(`${pulled.join(' and ')} unplugged`)
  if (!condition.battery) words.push('battery disconnected')
  if (condition.charging) words.push('charging')
  for (const lead of condition.added) words.push(addedWords(circuit, lead))
  return words.join(', ') || 'everything at rest'
}

export function unpluggedName(circuit: Circuit, id: string): string {
  const connector = circuit.connectors.find((one) => one.id === id)
  if (connector) return connectorName(connector)
  const node = circuit.nodes.find((one) => one.id === id)
  return node ? nodeName(node) : id
}

/** What a reading measures: "F3 out to chassis", "current in wire F3 out to Door module pin 1", "Left lamp". */
export function measuredWords(
  circuit: Circuit,
  reading: { kind: string; red?: string; black?: string; wire?: string; node?: string; pin?: string },
): string {
  if (reading.red !== undefined)
    return `${pointName(circuit, reading.red)} to ${pointName(circuit, reading.black ?? 'chassis')}`
  if (reading.wire !== undefined) return siteName(circuit, `wire:${reading.wire}`)
  if (reading.node !== undefined) return siteName(circuit, `part:${reading.node}`)
  return reading.pin === undefined ? '' : pointName(circuit, reading.pin)
}

/** Words that stand at the head of a sentence. */
export function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1)
}
