import fc from 'fast-check'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { portsOf } from '@/diagrams/document/ports'

const kinds = [
  { kind: 'battery' },
  { kind: 'feed' },
  { kind: 'ground' },
  { kind: 'fuse', amps: 10 },
  {
    kind: 'switch',
    contacts: [
      { id: 'c1', a: 'a', b: 'b' },
      { id: 'c2', a: 'a', b: 'c' },
    ],
  },
  { kind: 'relay' },
  { kind: 'load', ohms: 5 },
  { kind: 'resistor', ohms: 100 },
  { kind: 'diode' },
  { kind: 'splice' },
  { kind: 'dlc' },
  {
    kind: 'module',
    pins: [
      { pin: '1', circuit: { type: 'supply', ohms: 100 } },
      { pin: '2', circuit: { type: 'ground' } },
      { pin: '3', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
      { pin: '4', circuit: { type: 'low-side' } },
      { pin: '5', circuit: { type: 'high-side' } },
      { pin: '6', circuit: { type: 'bridge', to: '3', ohms: 120 } },
    ],
  },
] as const

/** Any parts joined by any wires, sense or none: what a half-drawn circuit looks like. */
export const anyCircuit: fc.Arbitrary<Circuit> = fc
  .record({
    parts: fc.array(
      fc.record({ kind: fc.nat(kinds.length - 1), plug: fc.boolean(), x: fc.nat(60), y: fc.nat(20) }),
      {
        minLength: 1,
        maxLength: 12,
      },
    ),
    joins: fc.array(fc.tuple(fc.nat(), fc.nat()), { maxLength: 24 }),
  })
  .map(({ parts, joins }) => {
    const bare = {
      format: 'halfsplit-circuit',
      version: 1,
      title: 'random',
      connectors: parts.map((_, at) => ({ id: `c${at}` })),
      nodes: parts.map((part, at) => ({
        ...kinds[part.kind],
        id: `n${at}`,
        x: part.x * 20,
        y: part.y * 20,
        ...(part.plug ? { connector: `c${at}` } : {}),
      })),
    }
    const opened = openCircuit({ ...bare, wires: [] })
    if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
    const ends = opened.value.nodes.flatMap((node) => portsOf(node).map((port) => `${node.id}.${port.name}`))
    const wires = joins.flatMap(([from, to], at) => {
      const [one, other] = [ends[from % ends.length], ends[to % ends.length]]
      return one === other ? [] : [{ id: `w${at}`, from: one, to: other }]
    })
    const whole = openCircuit({ ...bare, wires })
    if (!whole.ok) throw new Error(JSON.stringify(whole.problems))
    return whole.value
  })
