import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import {
  readingSchema,
  type Probe,
  type Reading,
  type ReadingValue,
} from '@/diagrams/document/reading-schema'
import { sitesOf, type Site } from '@/diagrams/document/sites'
import { clearances } from '@/diagrams/faults/clearance'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import type { FaultModel } from '@/diagrams/faults/fault-model'
import { candidateReadings } from '@/diagrams/planner/candidates'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { drawOf, oddShapes, type Draw } from './odd-draws'
import { plantFault } from './plant-fault'
import { seededRandom, type Random } from './random'
import { asDrawn, Vehicle } from './vehicle'

export interface ClearanceRun {
  fault: PlantedFault
  readings: Reading[]
  /** How many of the readings are slips. */
  slips: number
  cleared: boolean
  firm: boolean
  clearedBy: string[]
  /** False for a fault that shows on this vehicle but would not on one exactly as drawn. */
  showsAsDrawn: boolean
}

const readingsFrom = 4
const readingsTo = 10

/** All readings that may be taken of a circuit by its conditions: as the planner asks them, and some besides. */
export function readingPool(circuit: Circuit): Probe[][] {
  const sets = candidateReadings(
    circuit,
    sitesOf(circuit).map((site) => site.id),
    restCondition,
    { limit: 1e6 },
  )
  return sets.flatMap(({ condition, probes }) => {
    const more: Probe[] = [...probes]
    if (condition.battery)
      for (const node of circuit.nodes) {
        if (node.kind === 'load') more.push({ kind: 'works', node: node.id, condition })
        if (node.kind === 'module')
          for (const { pin, circuit: inner } of node.pins)
            if (inner.type === 'pull-up' || inner.type === 'pull-down')
              more.push({ kind: 'sees', pin: `${node.id}.${pin}`, condition })
      }
    if (!condition.battery) return [more]
    return [more, more.map((probe) => ({ ...probe, condition: { ...condition, charging: true } }))]
  })
}

/**
 * One fault of one site on one vehicle, some readings of it, and whether the rule clears the true site:
 * null when no fault drawn shows. `model` suspects that site alone. The seed decides everything.
 */
export function clearanceRun(
  model: FaultModel,
  site: Site,
  pool: readonly Probe[][],
  seed: number,
  slip: { share: number; exactly?: number } = { share: 0 },
): ClearanceRun | null {
  const drawn = readFaulty(model, site, pool, seed, slip)
  if (!drawn) return null
  const { fault, readings } = drawn
  const found = clearances(model, weighReadings(model, readings), readings, [site.id]).get(site.id)!
  const showsAsDrawn = !found.cleared || new Vehicle(model.network, asDrawn, fault).shows()
  return { ...drawn, ...found, showsAsDrawn }
}

/** A fault of a site, drawn oddly, and readings of a vehicle that has it. */
export function readFaulty(
  model: FaultModel,
  site: Site,
  pool: readonly Probe[][],
  seed: number,
  slip: { share: number; exactly?: number } = { share: 0 },
): { fault: PlantedFault; readings: Reading[]; slips: number } | null {
  const random = seededRandom(seed)
  const draw = () => drawOf(random.pick(oddShapes), random)
  for (let tries = 0; tries < 8; tries++) {
    const drawn = draw()
    // Just short of 1: it also picks from lists.
    const severity = () => Math.min(drawn(), 1 - 1e-9)
    const fault = plantFault(model.circuit, site.id, random.pick(site.modes), severity)
    const part = draw()
    const battery = draw()
    const vehicle = new Vehicle(
      model.network,
      {
        partFactor: () => 0.95 + 0.1 * part(),
        restingVolts: 11.8 + battery(),
        chargingVolts: 13.5 + 1.3 * battery(),
      },
      fault,
    )
    if (!vehicle.shows()) continue
    const { readings, slips } = takeReadings(vehicle, pool, draw(), random, slip)
    if (readings.length === 0) continue
    return { fault, readings, slips }
  }
  return null
}

function takeReadings(
  vehicle: Vehicle,
  pool: readonly Probe[][],
  meter: Draw,
  random: Random,
  slip: { share: number; exactly?: number },
) {
  const readings: Reading[] = []
  const wanted = random.whole(readingsFrom, readingsTo)
  const slipped = new Set<number>()
  while (slipped.size < (slip.exactly ?? 0)) slipped.add(random.whole(0, wanted - 1))
  let slips = 0
  // Few conditions with several readings each, as one works: battery and states are then shared.
  let condition = random.pick(pool)
  for (let tries = 0; readings.length < wanted && tries < 3 * wanted; tries++) {
    if (random.chance(0.4)) condition = random.pick(pool)
    const probe = random.pick(condition)
    const slips_ = slipped.has(readings.length) || random.chance(slip.share)
    // A slip: the leads on another place, or the vehicle in another condition, than was written down.
    const truth = vehicle.read(slips_ ? elsewhere(probe, condition, pool, random) : probe)
    if (truth === null) continue
    const accuracy = random.chance(0.2) ? random.pick(meters) : undefined
    const value = shown(probe, truth, meter, accuracy)
    const reading = { id: `r${readings.length + 1}`, ...probe, value, ...(accuracy ? { accuracy } : {}) }
    readings.push(readingSchema.parse(reading))
    if (slips_) slips++
  }
  return { readings, slips }
}

/** A poor meter and a good one, percent and floor. */
const meters = [
  { percent: 2, floor: 0.1 },
  { percent: 0.1, floor: 0.005 },
]

function elsewhere(probe: Probe, condition: Probe[], pool: readonly Probe[][], random: Random): Probe {
  const alike = (list: readonly Probe[]) => list.filter((other) => other.kind === probe.kind)
  const here = alike(condition)
  const there = alike(random.pick(pool))
  return random.pick(random.chance(0.5) && there.length > 0 ? there : here)
}

/** Limits of the format's page: part of the value and a floor. */
const limits = { volts: [0.5, 0.02], ohms: [0.5, 0.2], amps: [2, 0.05] } as const

function shown(
  probe: Probe,
  truth: ReadingValue,
  meter: Draw,
  accuracy: { percent: number; floor: number } | undefined,
): ReadingValue {
  if (typeof truth !== 'number' || (probe.kind !== 'volts' && probe.kind !== 'ohms' && probe.kind !== 'amps'))
    return truth
  const [percent, floor] = accuracy ? [accuracy.percent, accuracy.floor] : limits[probe.kind]
  const off = truth + (2 * meter() - 1) * ((percent / 100) * Math.abs(truth) + floor)
  if (probe.kind !== 'ohms') return off
  return off > 40e6 ? 'OL' : Math.max(0, off)
}
