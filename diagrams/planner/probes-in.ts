import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import type { Node } from '../document/node-schema'
import { hasContact, portsOf, wiresByEnd } from '../document/ports'
import type { Probe } from '../document/reading-schema'
import { neighbourWires } from '../document/sites'

/** Readings worth weighing in one condition, leads and eyes where a person would put them. */
export function probesIn(circuit: Circuit, condition: Condition): Probe[] {
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
    if (plugged) for (const wire of circuit.wires) probes.push({ kind: 'amps', wire: wire.id, condition })
    return [...probes, ...seenIn(circuit, condition)]
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

/** What needs no lead: whether each load that is plugged in works, and what each module says of its inputs. */
export function seenIn(circuit: Circuit, condition: Condition): Probe[] {
  const wired = wiresByEnd(circuit)
  const opened = new Set(condition.unplugged)
  const isPlugged = (node: Node) =>
    portsOf(node).every((p) => p.connector === null || !opened.has(p.connector))
  return circuit.nodes.flatMap((node): Probe[] => {
    // What is unplugged itself does nothing, whatever is wrong.
    if (!isPlugged(node)) return []
    if (node.kind === 'load') return [{ kind: 'works', node: node.id, condition }]
    if (node.kind !== 'module') return []
    return node.pins.flatMap((pin): Probe[] => {
      const point = `${node.id}.${pin.pin}`
      const isInput = pin.circuit.type === 'pull-up' || pin.circuit.type === 'pull-down'
      return isInput && wired.has(point) ? [{ kind: 'sees', pin: point, condition }] : []
    })
  })
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
