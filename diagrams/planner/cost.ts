import { positionsIn } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { restCondition } from '../document/condition-schema'
import { parsePoint } from '../document/points'
import { portsOf } from '../document/ports'
import type { Probe } from '../document/reading-schema'

/** Minutes of the format's page; where nothing is said of a part, 2 to reach it. */
const readingMinutes = 0.5
const controlMinutes = 0.2
const batteryMinutes = 3
const plainAccessMinutes = 2
/** To put in a lead or a stand-in load (common practice, no source; the page gives none). */
const leadMinutes = 1

/** Where the person stands: the condition of the vehicle and what is laid open already. */
export interface Workplace {
  condition: Condition
  reached: ReadonlySet<string>
}

export const freshWorkplace: Workplace = { condition: restCondition, reached: new Set() }

/** The workplace after these readings. */
export function workplaceAfter(circuit: Circuit, probes: readonly Probe[]): Workplace {
  const reached = new Set<string>()
  for (const probe of probes) {
    for (const place of placesOf(circuit, probe)) reached.add(place.id)
    for (const id of probe.condition.unplugged) reached.add(id)
    for (const { from, to } of probe.condition.added)
      for (const point of [from, to]) {
        const place = placeOf(circuit, point)
        if (place) reached.add(place.id)
      }
  }
  return { condition: probes.at(-1)?.condition ?? restCondition, reached }
}

/** Minutes to take one reading from where one stands. */
export function minutesFor(circuit: Circuit, probe: Probe, workplace: Workplace): number {
  let minutes = readingMinutes
  const now = positionsIn(circuit, workplace.condition.controls)
  const then = positionsIn(circuit, probe.condition.controls)
  for (const control of circuit.controls) if (now[control.id] !== then[control.id]) minutes += controlMinutes
  if (workplace.condition.battery !== probe.condition.battery) minutes += batteryMinutes
  const reached = new Set(workplace.reached)
  const reach = (id: string, access: number) => {
    if (reached.has(id)) return
    reached.add(id)
    minutes += access
  }
  for (const id of probe.condition.unplugged) {
    if (workplace.condition.unplugged.includes(id)) continue
    const access = accessOf(circuit, id)
    reach(id, access)
    minutes += 1 + access / 2
  }
  for (const place of placesOf(circuit, probe)) reach(place.id, place.minutes)
  const isIn = (lead: Lead) => workplace.condition.added.some((other) => sameLead(other, lead))
  for (const lead of probe.condition.added) {
    if (isIn(lead)) continue
    minutes += leadMinutes
    for (const point of [lead.from, lead.to]) {
      const place = placeOf(circuit, point)
      if (place) reach(place.id, place.minutes)
    }
  }
  return minutes
}

type Lead = Condition['added'][number]

function sameLead(a: Lead, b: Lead): boolean {
  return a.from === b.from && a.to === b.to && a.ohms === b.ohms
}

interface Place {
  id: string
  minutes: number
}

/** Connectors and parts that the leads have to get at. A load can be seen or heard from where one stands. */
export function placesOf(circuit: Circuit, probe: Probe): Place[] {
  switch (probe.kind) {
    case 'volts':
    case 'ohms':
      return [probe.red, probe.black].flatMap((point) => placeOf(circuit, point) ?? [])
    case 'amps': {
      const wire = circuit.wires.find((w) => w.id === probe.wire)!
      const ends = [wire.from, wire.to].flatMap((end) => placeOf(circuit, end) ?? [])
      return ends.toSorted((a, b) => a.minutes - b.minutes).slice(0, 1)
    }
    default:
      return []
  }
}

function placeOf(circuit: Circuit, text: string): Place | null {
  const point = parsePoint(text)
  const node = point && circuit.nodes.find((n) => n.id === point.node)
  if (!point || !node) return null
  const connector = portsOf(node).find((p) => p.name === point.port)?.connector
  const id = connector ?? node.id
  return {
    id,
    minutes: node.accessMinutes ?? (connector ? accessOf(circuit, connector) : plainAccessMinutes),
  }
}

function accessOf(circuit: Circuit, id: string): number {
  return (
    circuit.connectors.find((c) => c.id === id)?.accessMinutes ??
    circuit.nodes.find((n) => n.id === id)?.accessMinutes ??
    plainAccessMinutes
  )
}
