import { controlCombinations } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import { restCondition, type Condition } from '../document/condition-schema'
import { portsOf, splitEnd } from '../document/ports'
import type { CandidateSet } from './candidates'
import { netOf } from './net-of'
import { probesIn } from './probes-in'

const combinationLimit = 8
/** Connectors and pulled parts round the places asked about. */
const mostOpened = 6
/** Most conditions of a wide search: bounded work, whatever the circuit. */
export const mostWide = 60

/**
 * Readings beyond those a person would think of first, for places that nothing else tells apart: any one or
 * two of the connectors, fuses and relays round them opened, live and dead, the controls at rest and moved.
 */
export function wideReadings(circuit: Circuit, sites: readonly string[]): CandidateSet[] {
  const opened = openableNear(circuit, sites)
  const singles = opened.map((id) => [id])
  const pairs = opened.flatMap((id, i) => opened.slice(i + 1).map((other) => [id, other]))
  const combinations = controlCombinations(circuit, combinationLimit)
  const controlSets = [...new Set([combinations[0]!, combinations.at(-1)!, ...combinations])]
  const conditions: Condition[] = []
  for (const controls of controlSets)
    for (const unplugged of [...singles, ...pairs])
      for (const battery of [false, true]) {
        if (conditions.length >= mostWide) break
        conditions.push({ ...restCondition, controls, unplugged, battery })
      }
  return conditions.map((condition) => ({ condition, probes: probesIn(circuit, condition) }))
}

/** What can be opened or pulled on the lines that the places are part of, nearest first. */
function openableNear(circuit: Circuit, sites: readonly string[]): string[] {
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const found = new Set<string>()
  const take = (end: string) => {
    const { node: id, port } = splitEnd(end)
    const node = nodes.get(id)
    if (!node) return
    const connector = portsOf(node).find((p) => p.name === port)?.connector
    if (connector) found.add(connector)
    else if (node.kind === 'fuse' || node.kind === 'relay') found.add(id)
  }
  const ends = sites.flatMap((site) => endsOf(circuit, site))
  for (const end of ends) take(end)
  for (const end of ends) for (const joined of netOf(circuit, end)) take(joined)
  return [...found].slice(0, mostOpened)
}

/** The wire ends at a place. */
function endsOf(circuit: Circuit, site: string): string[] {
  const rest = site.slice(site.indexOf(':') + 1)
  const wire = site.startsWith('wire:') && circuit.wires.find((w) => w.id === rest)
  if (wire) return [wire.from, wire.to]
  const node = circuit.nodes.find((n) => n.id === rest.split('.')[0])
  if (!node) return []
  const own = portsOf(node).map((port) => `${node.id}.${port.name}`)
  return own.includes(rest) ? [rest] : own
}
