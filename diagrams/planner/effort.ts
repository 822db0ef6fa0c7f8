import { positionsIn } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
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

export interface Place {
  id: string
  minutes: number
}

/** How a condition stands, ready to be compared with another. */
export interface Standing {
  positions: readonly string[]
  battery: boolean
  opened: readonly Place[]
  leads: readonly string[]
}

/** All that a reading costs, whatever came before it. */
export interface Effort extends Standing {
  /** What the leads of the meter, and those put in, have to get at. */
  places: readonly Place[]
  /** All that is laid open after it. */
  reaches: readonly string[]
}

export function standingIn(circuit: Circuit, condition: Condition): Standing {
  const positions = positionsIn(circuit, condition.controls)
  return {
    positions: circuit.controls.map((control) => positions[control.id]!),
    battery: condition.battery,
    opened: condition.unplugged.map((id) => ({ id, minutes: accessOf(circuit, id) })),
    leads: condition.added.map(({ from, to, ohms }) => `${from} ${to} ${ohms}`),
  }
}

/** `standing`: that of the probe's condition, where it is known already. */
export function effortOf(
  circuit: Circuit,
  probe: Probe,
  standing = standingIn(circuit, probe.condition),
): Effort {
  const ends = probe.condition.added.flatMap(({ from, to }) => [from, to])
  const places = [...placesOf(circuit, probe), ...ends.flatMap((point) => placeOf(circuit, point) ?? [])]
  return { ...standing, places, reaches: [...standing.opened, ...places].map(({ id }) => id) }
}

/** Minutes of a reading for one who stands in a condition and has laid these places open. */
export function minutesOf(effort: Effort, now: Standing, reached: ReadonlySet<string>): number {
  let minutes = readingMinutes
  effort.positions.forEach((position, i) => {
    if (position !== now.positions[i]) minutes += controlMinutes
  })
  if (effort.battery !== now.battery) minutes += batteryMinutes
  const fresh = new Set<string>()
  const reach = ({ id, minutes: access }: Place) => {
    if (reached.has(id) || fresh.has(id)) return
    fresh.add(id)
    minutes += access
  }
  for (const place of effort.opened) {
    if (now.opened.some(({ id }) => id === place.id)) continue
    reach(place)
    minutes += 1 + place.minutes / 2
  }
  for (const lead of effort.leads) if (!now.leads.includes(lead)) minutes += leadMinutes
  for (const place of effort.places) reach(place)
  return minutes
}

/** Connectors and parts that the meter has to get at. A load can be seen or heard from where one stands. */
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

/** Asked for every reading weighed, of a document that does not change. */
const placesByCircuit = new WeakMap<Circuit, Map<string, Place | null>>()

function placeOf(circuit: Circuit, text: string): Place | null {
  let known = placesByCircuit.get(circuit)
  if (!known) placesByCircuit.set(circuit, (known = new Map()))
  let place = known.get(text)
  if (place === undefined) known.set(text, (place = findPlace(circuit, text)))
  return place
}

function findPlace(circuit: Circuit, text: string): Place | null {
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
