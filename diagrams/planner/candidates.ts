import { conditionKey, controlCombinations, positionsIn } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import { restCondition, type Condition } from '../document/condition-schema'
import { portsOf, splitEnd } from '../document/ports'
import type { Probe } from '../document/reading-schema'
import { probesIn } from './probes-in'

/** Readings worth weighing in one condition. */
export interface CandidateSet {
  condition: Condition
  probes: Probe[]
}

const combinationLimit = 8
/** Most conditions ever weighed. */
export const mostConditions = 48

/**
 * Conditions and readings a person would think of: every combination of controls with everything
 * plugged in; the battery off; one connector opened, live and dead; both ends of a suspect wire
 * opened. `suspects` are site ids, most probable first; they decide what is kept when there are many.
 * `deadControls`: where the controls stand while a connector is open and the battery off; `limit`:
 * how many conditions at most.
 */
export function candidateReadings(
  circuit: Circuit,
  suspects: readonly string[],
  present: Condition,
  {
    deadControls = {},
    limit = mostConditions,
  }: { deadControls?: Condition['controls']; limit?: number } = {},
): CandidateSet[] {
  const combinations = controlCombinations(circuit, combinationLimit)
  const controlSets = [positionsIn(circuit, present.controls), ...combinations]
  const conditions: Condition[] = []
  const live = (controls: Condition['controls'], unplugged: string[] = []): Condition => ({
    ...restCondition,
    controls,
    unplugged,
  })
  const dead = (unplugged: string[] = [], controls: Condition['controls'] = {}): Condition => ({
    ...restCondition,
    battery: false,
    controls,
    unplugged,
  })
  for (const controls of controlSets) conditions.push(live(controls))
  for (const controls of combinations) conditions.push(dead([], controls))
  const opened = connectorsNear(circuit, suspects)
  for (const pair of opened) conditions.push(dead(pair, deadControls))
  const singles = [...new Set(opened.flat())]
  for (const id of singles) conditions.push(dead([id], deadControls))
  // A circuit is in use in one of its last combinations, controls moved from rest.
  for (const id of singles)
    for (const controls of [combinations.at(-1)!, combinations[0]!]) conditions.push(live(controls, [id]))
  const kept = new Map<string, Condition>()
  for (const condition of conditions)
    if (kept.size < limit) kept.set(conditionKey(circuit, condition), condition)
  return [...kept.values()].map((condition) => ({ condition, probes: probesIn(circuit, condition) }))
}

/** Connectors and pairs of connectors whose opening frees a suspect wire, most suspect first. */
function connectorsNear(circuit: Circuit, suspects: readonly string[]): string[][] {
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const connectorAt = (end: string): string | null => {
    const { node: id, port } = splitEnd(end)
    const node = nodes.get(id)
    if (!node) return null
    return portsOf(node).find((p) => p.name === port)?.connector ?? null
  }
  const found = new Map<string, string[]>()
  const add = (ids: (string | null)[]) => {
    const list = [...new Set(ids.filter((id) => id !== null))].toSorted()
    if (list.length > 0) found.set(list.join(','), list)
  }
  for (const site of suspects) {
    const rest = site.slice(site.indexOf(':') + 1)
    if (site.startsWith('wire:')) {
      const wire = circuit.wires.find((w) => w.id === rest)
      if (wire) add([connectorAt(wire.from), connectorAt(wire.to)])
      continue
    }
    const node = nodes.get(rest.split('.')[0]!)
    if (!node) continue
    add([node.connector ?? null])
    for (const port of portsOf(node)) if (rest === `${node.id}.${port.name}`) add([port.connector])
    if (node.kind === 'fuse' || node.kind === 'relay') add([node.id])
  }
  return [...found.values()]
}
