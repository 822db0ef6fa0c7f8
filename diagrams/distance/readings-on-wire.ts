import type { Circuit, Wire } from '../document/circuit-schema'
import { conditionKey } from '../document/condition'
import { portsOf, splitEnd } from '../document/ports'
import { neighbourWires } from '../document/sites'
import type { Reading } from '../document/reading-schema'
import { measuredBy, type Measured } from './measured'
import { apart, bothEndsOpen } from './open-ends'

export type Ohms = Extract<Reading, { kind: 'volts' | 'ohms' }>
type Accuracy = (reading: Reading) => { percent: number; floor: number }

/** Those of a trace's readings that say something of where along a wire a short lies. */
export interface ReadingsOnWire {
  near?: Measured
  far?: Measured
  whole?: Measured
  /** The wire it touches, where the black lead stood on that wire at the same end. */
  beside: Wire | null
  nearDrop?: { volts: Measured; amps: Measured }
  farDrop?: { volts: Measured; amps: Measured }
  /** Ids of the readings used. */
  used: string[]
  /** At an end of the wire with another part still joined to it; ids. */
  joined: string[]
  /** Between an open wire and what it may touch: out of range, so that nothing touches; ids. */
  untouched: string[]
}

/**
 * Picks them: ohms from an end to one common point, or to the same end of a wire beside it; ohms from end to end; volts
 * from end to end with the wire's amperes in the same condition. Both ends must be open in ohms, the far one in volts.
 * The later of two alike counts.
 */
export function readingsOnWire(
  circuit: Circuit,
  wire: Wire,
  readings: readonly Reading[],
  accuracyOf: Accuracy,
): ReadingsOnWire {
  const found: ReadingsOnWire = { beside: null, used: [], joined: [], untouched: [] }
  const from: Taken = new Map()
  const to: Taken = new Map()
  for (const reading of readings) {
    if (reading.kind === 'volts') takeDrop(circuit, wire, reading, readings, accuracyOf, found)
    if (reading.kind !== 'ohms') continue
    const [end, other] = endAndOther(wire, reading)
    if (end === null) continue
    if (!bothEndsOpen(circuit, wire, reading.condition, other === otherEnd(wire, end) ? 'chassis' : other)) {
      found.joined.push(reading.id)
      continue
    }
    if (reading.value === 'OL') {
      found.untouched.push(reading.id)
      continue
    }
    const measured = measuredBy(reading.value, accuracyOf(reading))
    if (other === otherEnd(wire, end)) {
      found.whole = measured
      found.used.push(reading.id)
      continue
    }
    ;(end === wire.from ? from : to).set(other, { measured, id: reading.id })
  }
  takePair(circuit, wire, from, to, found)
  return found
}

/** Readings from one end, by where the black lead was. */
type Taken = Map<string, { measured: Measured; id: string }>

/** From both ends against one point; else against the same end each of a wire beside; else from one end alone. */
function takePair(circuit: Circuit, wire: Wire, from: Taken, to: Taken, found: ReadingsOnWire): void {
  const keep = (near: string | undefined, far: string | undefined): boolean => {
    const [a, b] = [from.get(near ?? ''), to.get(far ?? '')]
    if (a) found.near = a.measured
    if (b) found.far = b.measured
    found.used.push(...[a, b].flatMap((taken) => (taken ? [taken.id] : [])))
    return true
  }
  const common = [...from.keys()].find((black) => to.has(black))
  if (common !== undefined && keep(common, common)) return
  for (const id of neighbourWires(circuit, wire.id)) {
    const other = circuit.wires.find((one) => one.id === id)!
    const [near, far] = [endBeside(circuit, other, wire.from), endBeside(circuit, other, wire.to)]
    if (near === null || far === null || !from.has(near) || !to.has(far)) continue
    found.beside = other
    keep(near, far)
    return
  }
  const [near] = from.keys()
  const [far] = to.keys()
  if (near !== undefined) keep(near, undefined)
  else if (far !== undefined) keep(undefined, far)
}

/** Volts along the wire, whichever way round the leads were, with the current that flowed meanwhile. */
function takeDrop(
  circuit: Circuit,
  wire: Wire,
  reading: Ohms,
  readings: readonly Reading[],
  accuracyOf: Accuracy,
  found: ReadingsOnWire,
): void {
  const [end, other] = endAndOther(wire, reading)
  if (end === null || other !== otherEnd(wire, end) || reading.value === 'OL') return
  const condition = conditionKey(circuit, reading.condition)
  const amps = readings.findLast(
    (one) =>
      one.kind === 'amps' && one.wire === wire.id && conditionKey(circuit, one.condition) === condition,
  )
  if (amps?.kind !== 'amps') return
  // Amperes are those at the wire's `from` end, so that this end is fed and the other one open.
  if (!apart(circuit, wire.id, reading.condition, wire.to, 'chassis')) {
    found.joined.push(reading.id)
    return
  }
  const drop = {
    volts: measuredBy(Math.abs(reading.value), accuracyOf(reading)),
    amps: measuredBy(Math.abs(amps.value), accuracyOf(amps)),
  }
  if (drop.amps.low <= 0) return
  found.nearDrop = drop
  found.used.push(reading.id, amps.id)
}

/** The end of a wire that lies at the same place as this end of another; null where neither does, or both. */
export function endBeside(circuit: Circuit, wire: Wire, end: string): string | null {
  const place = placeOf(circuit, end)
  const [from, to] = [placeOf(circuit, wire.from) === place, placeOf(circuit, wire.to) === place]
  return from === to ? null : from ? wire.from : wire.to
}

/** Connector and side where there is one, else the part. */
function placeOf(circuit: Circuit, end: string): string {
  const { node: id, port: name } = splitEnd(end)
  const node = circuit.nodes.find((one) => one.id === id)
  const port = node && portsOf(node).find((one) => one.name === name)
  if (node?.kind === 'cavity') return `${node.connector}/${name}`
  return port?.connector ?? id
}

function endAndOther(wire: Wire, { red, black }: Ohms): [string, string] | [null, null] {
  if (red === wire.from || red === wire.to) return [red, black]
  return black === wire.from || black === wire.to ? [black, red] : [null, null]
}

function otherEnd(wire: Wire, end: string): string {
  return end === wire.from ? wire.to : wire.from
}
