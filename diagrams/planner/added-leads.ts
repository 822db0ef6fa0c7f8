import { controlCombinations, positionsIn } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import { restCondition, type Condition } from '../document/condition-schema'
import type { Node, NodeOf } from '../document/node-schema'
import { hasContact, portsOf, wiresByEnd } from '../document/ports'
import type { Probe } from '../document/reading-schema'
import { fusedLeadOhms, testLampOhms } from '../solver/added-lead'
import { netOf } from './net-of'
import type { CandidateSet } from './candidates'
import { seenIn } from './probes-in'

type Lead = Condition['added'][number]

const combinationLimit = 8
/** Most conditions with something put in that are ever weighed. */
export const mostWithLeads = 10
/** Suspects beyond these bring no lead of their own. */
const mostSuspects = 8

/**
 * Readings that need a lead or a stand-in load put in, as the trade does where plain readings tell
 * nothing more: a relay's contact bridged in its socket, a test lamp that loads a line or stands in for
 * a load, a fused jumper that feeds or grounds a load. None on airbag circuits. Whether a lead
 * would carry more than its fuse with one of the suspects at fault is for `leadsAreSafe` to say.
 */
export function readingsWithLeads(
  circuit: Circuit,
  suspects: readonly string[],
  present: Condition,
): CandidateSet[] {
  if (circuit.cautions.includes('airbag')) return []
  const combinations = controlCombinations(circuit, combinationLimit)
  const controlSets = [combinations.at(-1)!, positionsIn(circuit, present.controls), combinations[0]!]
  const nodes = nodesNear(circuit, suspects.slice(0, mostSuspects))
  const found = new Map<string, CandidateSet>()
  const add = (
    change: Pick<Condition, 'unplugged' | 'added'>,
    probesFor: (condition: Condition) => Probe[],
  ) => {
    for (const controls of controlSets) {
      const condition: Condition = { ...restCondition, controls, ...change }
      const key = JSON.stringify([change, positionsIn(circuit, controls)])
      if (!found.has(key) && found.size < mostWithLeads)
        found.set(key, { condition, probes: probesFor(condition) })
    }
  }
  for (const node of nodes) {
    if (node.kind === 'relay') bridgeContact(circuit, node, add)
    if (node.kind === 'load') {
      lampInPlace(circuit, node, add)
      feedAlone(circuit, node, add)
      jumperTo(circuit, node, add)
    }
    if (node.kind === 'module') lampOnLines(circuit, node, suspects, add)
  }
  return [...found.values()]
}

type Add = (
  change: Pick<Condition, 'unplugged' | 'added'>,
  probesFor: (condition: Condition) => Probe[],
) => void

/** The relay pulled, 30 joined to 87 in its socket: what it feeds works if all but relay and coil side is good. */
function bridgeContact(circuit: Circuit, relay: NodeOf<'relay'>, add: Add) {
  const wired = wiresByEnd(circuit)
  const [from, to] = [`${relay.id}.30`, `${relay.id}.87`]
  if (!wired.has(from) || !wired.has(to)) return
  add({ unplugged: [relay.id], added: [{ from, to, ohms: fusedLeadOhms }] }, (condition) => [
    ...seenIn(circuit, condition),
    { kind: 'volts', red: to, black: 'chassis', condition },
  ])
}

/** A test lamp on the plug of a load that is off: feed and ground under load, the load itself out of it. */
function lampInPlace(circuit: Circuit, load: NodeOf<'load'>, add: Add) {
  const [a, b] = ['a', 'b'].map((port) => harnessPoint(circuit, load, port))
  if (!a || !b) return
  add({ unplugged: unplug(load), added: [{ from: a, to: b, ohms: testLampOhms }] }, (condition) => [
    { kind: 'volts', red: a, black: b, condition },
    { kind: 'volts', red: a, black: 'chassis', condition },
  ])
}

/** Feed and ground brought to the load itself, its plug off: does it work at all. */
function feedAlone(circuit: Circuit, load: NodeOf<'load'>, add: Add) {
  const supply = supplyPoint(circuit)
  if (!supply || !load.connector) return
  const added: Lead[] = [
    { from: supply, to: `${load.id}.a:part`, ohms: fusedLeadOhms },
    { from: `${load.id}.b:part`, to: 'chassis', ohms: fusedLeadOhms },
  ]
  add({ unplugged: unplug(load), added }, (condition) => [{ kind: 'works', node: load.id, condition }])
}

/** One side of a plugged-in load brought to ground, or to the supply, by a fused jumper. */
function jumperTo(circuit: Circuit, load: NodeOf<'load'>, add: Add) {
  const supply = supplyPoint(circuit)
  const works = (condition: Condition): Probe[] => [{ kind: 'works', node: load.id, condition }]
  for (const port of ['a', 'b']) {
    const point = harnessPoint(circuit, load, port)
    if (!point) continue
    const net = netOf(circuit, point)
    // Grounding what a driver pulls up, or feeding what it pulls down, is not for a jumper; nor is an input.
    if (net.every((end) => mayBeGrounded(circuit, end)))
      add({ unplugged: [], added: [{ from: point, to: 'chassis', ohms: fusedLeadOhms }] }, works)
    if (supply && net.every((end) => mayBeFed(circuit, end)))
      add({ unplugged: [], added: [{ from: supply, to: point, ohms: fusedLeadOhms }] }, works)
  }
}

/** A line that shows volts with a module's plug off, loaded with a lamp: a ghost or a bad joint gives way. */
function lampOnLines(circuit: Circuit, module: NodeOf<'module'>, suspects: readonly string[], add: Add) {
  for (const pin of module.pins) {
    const point = harnessPoint(circuit, module, pin.pin)
    const connector = pin.connector ?? module.connector
    const isSuspect = [
      `contact:${point}`,
      `pin:${point}`,
      ...(wiresByEnd(circuit).get(point ?? '') ?? []).map((w) => `wire:${w}`),
    ].some((site) => suspects.includes(site))
    if (!point || !connector || !isSuspect) continue
    const supply = supplyPoint(circuit)
    const other = pin.circuit.type === 'ground' || pin.circuit.type === 'low-side' ? supply : 'chassis'
    if (!other) continue
    add({ unplugged: [connector], added: [{ from: point, to: other, ohms: testLampOhms }] }, (condition) => [
      { kind: 'volts', red: point, black: 'chassis', condition },
    ])
  }
}

function unplug(node: Node): string[] {
  return [...new Set(portsOf(node).flatMap((port) => port.connector ?? []))]
}

/** The harness side of a port that can be freed by unplugging and has a wire. */
function harnessPoint(circuit: Circuit, node: Node, name: string): string | null {
  const port = portsOf(node).find((p) => p.name === name)
  const point = `${node.id}.${name}`
  return port && hasContact(node, port) && wiresByEnd(circuit).has(point) ? point : null
}

/** Where a jumper takes its feed: the battery's plus, else the first feed that is always live. */
function supplyPoint(circuit: Circuit): string | null {
  const battery = circuit.nodes.find((node) => node.kind === 'battery')
  const feed = circuit.nodes.find((node) => node.kind === 'feed' && node.live === 'always')
  return battery ? `${battery.id}.pos` : feed ? `${feed.id}.out` : null
}

function mayBeGrounded(circuit: Circuit, end: string): boolean {
  const [node, pin] = partAt(circuit, end)
  if (node.kind === 'battery') return end.endsWith('.neg')
  if (node.kind === 'feed') return false
  return node.kind !== 'module' || pin === 'ground' || pin === 'low-side'
}

function mayBeFed(circuit: Circuit, end: string): boolean {
  const [node] = partAt(circuit, end)
  if (node.kind === 'battery') return end.endsWith('.pos')
  return node.kind !== 'module' && node.kind !== 'ground'
}

function partAt(circuit: Circuit, end: string): [Node, string | null] {
  const dot = end.indexOf('.')
  const node = circuit.nodes.find((n) => n.id === end.slice(0, dot))!
  const pin = node.kind === 'module' ? node.pins.find((p) => p.pin === end.slice(dot + 1)) : undefined
  return [node, pin?.circuit.type ?? null]
}

/** Relays, loads and modules that a suspect is, or is wired to, most suspect first. */
function nodesNear(circuit: Circuit, suspects: readonly string[]): Node[] {
  const nodes = new Map(circuit.nodes.map((node) => [node.id, node]))
  const found = new Set<Node>()
  const take = (id: string) => {
    const node = nodes.get(id)
    if (node?.kind === 'relay' || node?.kind === 'load' || node?.kind === 'module') found.add(node)
  }
  for (const site of suspects) {
    const rest = site.slice(site.indexOf(':') + 1)
    const wire = site.startsWith('wire:') ? circuit.wires.find((w) => w.id === rest) : undefined
    const points = wire ? [wire.from, wire.to] : [rest]
    for (const point of points) {
      take(point.split('.')[0]!)
      for (const end of netOf(circuit, point)) take(end.split('.')[0]!)
    }
  }
  return [...found]
}
