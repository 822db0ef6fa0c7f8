import { conductorOhms, ohmsAtTemperature, referenceCelsius } from './distance/wire-resistance'
import { distanceWords } from './distance/distance-sentence'
import { faultFraction, type DistanceMethod, type WireReadings } from './distance/fault-fraction'
import { sum, type Limits, type Measured } from './distance/measured'
import { unplugFor } from './distance/open-ends'
import { endBeside, readingsOnWire, type ReadingsOnWire } from './distance/readings-on-wire'
import type { Circuit, Wire } from './document/circuit-schema'
import type { Probe, Reading } from './document/reading-schema'
import { restCondition } from './document/condition-schema'
import { pointName } from './document/points'
import { siteName } from './document/sites'
import { accuracyOf } from './faults/tolerance-rule'
import { copperOhmMm2PerMetre } from './solver/constants'

/** Every resistance but contacts may differ from the drawing by this part. */
const wireTolerance = 0.05

export interface DistanceRequest {
  circuit: Circuit
  /** Id of the wire that has the short. */
  wire: string
  /** In the shape of a trace; those that say nothing of this wire are passed over. */
  readings: readonly Reading[]
  /**
   * Volts from end to end at a current fed in at that end, for what a trace's readings cannot say; the other end is open.
   */
  drops?: readonly { end: 'from' | 'to'; volts: Measured; amps: Measured }[]
  /** Of the wire; 20 unless given. */
  celsius?: number
  /** Ohm of the test leads in every ohm reading: none when the meter was zeroed with them. */
  leads?: Limits
}

export interface FaultDistance {
  method: DistanceMethod
  /** Metres from the wire's `from` end: the likeliest, and those it surely lies between. */
  metres: number
  lowMetres: number
  highMetres: number
  /** Farthest that the short can lie from `metres`. */
  giveOrTakeMetres: number
  sigmaMetres: number
  /** Ohm of the short itself and the way back from it, where the readings say it. */
  faultOhms: number | null
  /** False when the readings cannot say where along the wire. */
  useful: boolean
  says: string
  /** Ids of the readings it rests on. */
  readings: string[]
}

export type FoundDistance =
  | { ok: true; value: FaultDistance }
  | { ok: false; problem: { path: string; message: string } }

/** Where along a wire its short to ground, to supply or to the wire beside it lies, with what it is uncertain by. */
export function distanceToFault(request: DistanceRequest): FoundDistance {
  const { circuit, celsius = referenceCelsius, leads = { low: 0, high: 0 } } = request
  const wire = circuit.wires.find((one) => one.id === request.wire)
  if (!wire) return refuse('wire', `wire "${request.wire}" does not exist`)
  if (!(celsius >= -60 && celsius <= 200))
    return refuse('celsius', `${celsius} °C: expected the wire's temperature, -60 to 200 °C`)
  if (!(leads.low >= 0 && leads.high >= leads.low && leads.high <= 100))
    return refuse('leads', `test leads of ${leads.low} to ${leads.high} ohm: expected 0 to 100 ohm`)
  const wrong = (request.drops ?? []).findIndex(
    ({ volts, amps }) => !(amps.low > 0) || !(volts.high >= 0) || !Number.isFinite(volts.high + amps.high),
  )
  if (wrong >= 0)
    return refuse(
      `drops.${wrong}`,
      'No current was measured through the wire: volts along it say nothing without amperes.',
    )
  const taken = readingsOnWire(circuit, wire, request.readings, accuracyOf)
  for (const { end, volts, amps } of request.drops ?? [])
    taken[end === 'from' ? 'nearDrop' : 'farDrop'] = { volts, amps }
  if (!taken.near && !taken.far && !taken.nearDrop && !taken.farDrop)
    return refuse('readings', missingWords(circuit, wire, taken))

  // Against a wire beside, the current runs along both: out on one and back on the other.
  const { beside } = taken
  const own = drawnOhms(wire, celsius)
  const drawn = beside ? sum(own, drawnOhms(beside, celsius)) : own
  const figures: WireReadings = {
    drawnOhms: drawn,
    wholeOhms: beside ? undefined : taken.whole,
    nearOhms: taken.near,
    farOhms: taken.far,
    // Volts along the wire are of this wire alone, so that they cannot share a sum with its neighbour.
    nearDrop: beside ? undefined : taken.nearDrop,
    farDrop: beside ? undefined : taken.farDrop,
    leads,
  }
  const found = faultFraction(figures)
  if (!found) return refuse('readings', contradictionWords(circuit, wire, figures))
  const words = distanceWords(found, wire.length, pointName(circuit, wire.from), pointName(circuit, wire.to))
  const [metres, lowMetres, highMetres] = [found.value, found.low, found.high].map(
    (s) => s * wire.length,
  ) as [number, number, number]
  return {
    ok: true,
    value: {
      method: found.method,
      metres,
      lowMetres,
      highMetres,
      giveOrTakeMetres: Math.max(highMetres - metres, metres - lowMetres),
      sigmaMetres: found.sigma * wire.length,
      faultOhms: found.faultOhms,
      useful: words.useful,
      says: beside && words.useful ? `${words.says} This takes both wires to run side by side.` : words.says,
      readings: request.readings.map((reading) => reading.id).filter((id) => taken.used.includes(id)),
    },
  }
}

/** The readings that would say it: ohms from both ends to what the wire touches, then from end to end, both ends open. */
export function distanceProbes(circuit: Circuit, wireId: string, other: string | null = null): Probe[] {
  const wire = circuit.wires.find((one) => one.id === wireId)
  if (!wire) return []
  const beside = circuit.wires.find((one) => one.id === other)
  const ends = [wire.from, wire.to, ...(beside ? [beside.from, beside.to] : [])]
  const unplugged = [...new Set(ends.flatMap((end) => unplugFor(circuit, end) ?? []))]
  const condition = { ...restCondition, unplugged, battery: false }
  const [near, far] = beside
    ? [endBeside(circuit, beside, wire.from), endBeside(circuit, beside, wire.to)]
    : [null, null]
  const along = near !== null && far !== null
  // Where the two do not run along with each other, the black lead stays where it is.
  return [
    { kind: 'ohms', red: wire.from, black: along ? near : (beside?.from ?? 'chassis'), condition },
    { kind: 'ohms', red: wire.to, black: along ? far : (beside?.from ?? 'chassis'), condition },
    ...(along ? [] : [{ kind: 'ohms' as const, red: wire.from, black: wire.to, condition }]),
  ]
}

/** Ohm of a wire as drawn at a temperature, with what real ones differ by. */
function drawnOhms(wire: Wire, celsius: number): Measured {
  const cold = wire.ohms ?? conductorOhms(copperOhmMm2PerMetre, wire.length, wire.mm2)
  const value = ohmsAtTemperature(cold, referenceCelsius, celsius)
  return { value, low: value * (1 - wireTolerance), high: value * (1 + wireTolerance) }
}

function refuse(path: string, message: string): FoundDistance {
  return { ok: false, problem: { path, message } }
}

function missingWords(circuit: Circuit, wire: Wire, { joined, untouched }: ReadingsOnWire): string {
  const name = siteName(circuit, `wire:${wire.id}`)
  if (untouched.length > 0)
    return `${untouched.join(' and ')} ${untouched.length === 1 ? 'shows' : 'show'} OL: the ${name} touches nothing there.`
  const fixed = [wire.from, wire.to].filter((end) => unplugFor(circuit, end) === null)
  const parts =
    joined.length > 0
      ? `${joined.join(' and ')} cannot be used: another part is still joined to the wire. `
      : ''
  if (fixed.length > 0)
    return `${parts}The ${name} cannot be opened at ${fixed.map((end) => pointName(circuit, end)).join(' and at ')}. Part it there first, then read from both ends.`
  return `${parts}Unplug both ends of the ${name} and read ohms from each end to what it touches.`
}

function contradictionWords(
  circuit: Circuit,
  wire: Wire,
  { drawnOhms: drawn, wholeOhms, nearOhms, farOhms, leads }: WireReadings,
): string {
  const name = siteName(circuit, `wire:${wire.id}`)
  const ohms = (value: number) => `${Number(value.toPrecision(2))} ohm`
  if (wholeOhms && (wholeOhms.low - leads.high > drawn.high || wholeOhms.high - leads.low < drawn.low))
    return `The ${name} reads ${ohms(wholeOhms.value)} from end to end, where its length and size give ${ohms(drawn.value)}. Check both in the drawing, and that both ends are open.`
  if (nearOhms && farOhms && nearOhms.high + farOhms.high - 2 * leads.low < drawn.low)
    return `The readings from both ends add up to less than the ${ohms(drawn.value)} of the ${name}. One end was not open: take them again.`
  return `The readings differ by more than the ${ohms(drawn.value)} of the ${name} allows. Take them again from its own two ends.`
}
