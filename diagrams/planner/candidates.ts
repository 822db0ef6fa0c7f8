import { conditionKey, controlCombinations, positionsIn } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import { restCondition, type Condition } from '../document/condition-schema'
import type { Node } from '../document/node-schema'
import { hasContact, portsOf, splitEnd, wiresByEnd } from '../document/ports'
import type { Probe } from '../document/reading-schema'
import { neighbourWires } from '../document/sites'

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

function probesIn(circuit: Circuit, condition: Condition): Probe[] {
  const wired = wiresByEnd(circuit)
  const probes: Probe[] = []
  const plugged = condition.unplugged.length === 0
  if (condition.battery) {
    for (const node of circuit.nodes)
      for (const port of portsOf(node)) {
        const end = `${node.id}.${port.name}`
        if (wired.has(end)) probes.push({ kind: 'volts', red: end, black: 'chassis', condition })
      }
    for (const [red, black] of circuit.nodes.flatMap(acrossPart))
      if (wired.has(red) && wired.has(black)) probes.push({ kind: 'volts', red, black, condition })
    if (!plugged) return probes
    for (const wire of circuit.wires) probes.push({ kind: 'amps', wire: wire.id, condition })
    for (const node of circuit.nodes)
      if (node.kind === 'load') probes.push({ kind: 'works', node: node.id, condition })
    return probes
  }
  const pairs = new Map<string, [string, string]>()
  const pair = (red: string, black: string) => {
    if (red !== black && !pairs.has(`${black} ${red}`)) pairs.set(`${red} ${black}`, [red, black])
  }
  const opened = new Set(condition.unplugged)
  const freed = new Set<string>()
  for (const node of circuit.nodes)
    for (const port of portsOf(node)) {
      const end = `${node.id}.${port.name}`
      const isOpen = (port.connector !== null && opened.has(port.connector)) || opened.has(node.id)
      if (wired.has(end) && (plugged || isOpen)) pair(end, 'chassis')
      if (isOpen && wired.has(end)) freed.add(end)
      if (isOpen && hasContact(node, port) && wired.has(end)) {
        pair(`${end}:part`, 'chassis')
        for (const other of portsOf(node))
          if (
            other !== port &&
            wired.has(`${node.id}.${other.name}`) &&
            opened.has(other.connector ?? node.id)
          )
            pair(`${end}:part`, `${node.id}.${other.name}:part`)
      }
    }
  for (const wire of circuit.wires) {
    if (!plugged && !freed.has(wire.from) && !freed.has(wire.to)) continue
    pair(wire.from, wire.to)
    for (const other of plugged ? [] : neighbourWires(circuit, wire.id)) {
      const beside = circuit.wires.find((w) => w.id === other)!
      const here = freed.has(wire.from) ? wire.from : wire.to
      for (const end of [beside.from, beside.to]) if (freed.has(end)) pair(here, end)
    }
  }
  if (plugged)
    for (const [red, black] of circuit.nodes.flatMap(acrossPart))
      if (wired.has(red) && wired.has(black)) pair(red, black)
  for (const [red, black] of pairs.values()) probes.push({ kind: 'ohms', red, black, condition })
  return probes
}

/** Pairs of ports with something in between worth measuring across. */
function acrossPart(node: Node): [string, string][] {
  const at = (a: string, b: string): [string, string] => [`${node.id}.${a}`, `${node.id}.${b}`]
  switch (node.kind) {
    case 'fuse':
      return [at('in', 'out')]
    case 'load':
    case 'resistor':
    case 'cavity':
      return [at('a', 'b')]
    case 'diode':
      return [at('anode', 'cathode')]
    case 'relay':
      return [at('86', '85'), at('30', '87'), at('30', '87a')]
    case 'switch':
      return node.contacts.map((contact) => at(contact.a, contact.b))
    case 'battery':
      return [at('pos', 'neg')]
    default:
      return []
  }
}
