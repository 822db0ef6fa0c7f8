import type { Circuit } from '@/diagrams/document/circuit-schema'
import { nodeName, pointName } from '@/diagrams/document/points'
import { splitEnd } from '@/diagrams/document/ports'
import type { OperatingPoint } from '@/diagrams/solver/operating-point'

export interface Happening {
  /** "K3 lamp relay pulls in; Left lamp and Right lamp work." */
  does: string
  /** "8.1 A from Battery" */
  draws: string
}

/** What the circuit does at this moment, in one sentence, and what it takes from its feeds. */
export function whatHappens(circuit: Circuit, point: OperatingPoint): Happening {
  const names = (ids: readonly string[]) =>
    ids.map((id) => {
      const node = circuit.nodes.find((one) => one.id === id)
      return node ? nodeName(node) : id
    })
  const pulled = names([...point.relays].filter(([, pulledIn]) => pulledIn).map(([id]) => id))
  const working = names([...point.loads].filter(([, load]) => load.works).map(([id]) => id))
  const blown = names(point.blown)
  const parts = [
    ...(blown.length > 0 ? [`${listed(blown)} ${blown.length === 1 ? 'has' : 'have'} blown`] : []),
    ...(pulled.length > 0 ? [`${listed(pulled)} ${pulled.length === 1 ? 'pulls' : 'pull'} in`] : []),
    ...(working.length > 0 ? [`${listed(working)} ${working.length === 1 ? 'works' : 'work'}`] : []),
  ]
  if (parts.length > 0 || point.loads.size > 0)
    return { does: parts.join('; ') || 'Nothing works', draws: draws(circuit, point) }
  const inputs = [...point.sees].map(([pin, level]) => `${pointName(circuit, pin)} sees ${level}`)
  return { does: listed(inputs) || 'Nothing to see work', draws: draws(circuit, point) }
}

function draws(circuit: Circuit, point: OperatingPoint): string {
  const sources = circuit.nodes.filter((node) => node.kind === 'battery' || node.kind === 'feed')
  const amps = new Map<string, number>()
  for (const wire of circuit.wires)
    for (const [end, sign] of [
      [wire.from, 1],
      [wire.to, -1],
    ] as const) {
      const { node, port } = splitEnd(end)
      if (port === 'neg' || !sources.some((source) => source.id === node)) continue
      amps.set(node, (amps.get(node) ?? 0) + sign * (point.wireAmps.get(wire.id) ?? 0))
    }
  const total = [...amps.values()].reduce((sum, one) => sum + one, 0)
  if (sources.length === 0) return ''
  const from = sources.length === 1 && sources[0] ? nodeName(sources[0]) : `${sources.length} feeds`
  return `${ampsWords(total)} from ${from}`
}

/** "8.1 A", "0.14 A", "2.3 mA": as many figures as tell something. */
export function ampsWords(amps: number): string {
  const size = Math.abs(amps)
  if (size < 0.00005) return '0 A'
  if (size < 0.1) return `${Number((amps * 1000).toFixed(size < 0.01 ? 1 : 0))} mA`
  return `${amps.toFixed(size < 1 ? 2 : 1)} A`
}

export function listed(names: readonly string[]): string {
  if (names.length <= 1) return names[0] ?? ''
  if (names.length > 4) return `${names.slice(0, 3).join(', ')} and ${names.length - 3} more`
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`
}
