import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { FaultModel } from '@/diagrams/faults/fault-model'
import { modeWeight } from '@/diagrams/faults/priors'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { plantFault } from '../../support/plant-fault'
import type { Random } from '../../support/random'
import { Vehicle } from '../../support/vehicle'

/** A vehicle with a fault that shows on it. */
export interface Patient {
  fault: PlantedFault
  vehicle: Vehicle
  /** Sites that count as the true one: either wire of a short between two. */
  sites: string[]
}

/**
 * Draws faults by the odds of the trade, each weight multiplied by `error` or divided by it (1: the odds
 * are right), severities log-even among those that show, parts and battery even within their ranges.
 */
export function faultDrawer(
  model: FaultModel,
  error: number,
  seedRandom: Random,
): (random: Random) => Patient {
  const { circuit } = model
  const kinds = new Map<string, { site: string; mode: PlantedFault['mode']; weight: number }>()
  for (const { site, mode } of model.hypotheses) {
    const key = `${site} ${mode}`
    if (kinds.has(key)) continue
    const wrong = seedRandom.chance(0.5) ? error : 1 / error
    kinds.set(key, { site, mode, weight: wrong * modeWeight(circuit, site, mode, 'trade') })
  }
  const list = [...kinds.values()]
  const total = list.reduce((sum, { weight }) => sum + weight, 0)
  return (random) => {
    for (;;) {
      let left = total * random.next()
      const kind = list.find(({ weight }) => (left -= weight) <= 0) ?? list.at(-1)!
      const found = patientWith(model, circuit, kind, random)
      if (found) return found
    }
  }
}

function patientWith(
  model: FaultModel,
  circuit: Circuit,
  { site, mode }: { site: string; mode: PlantedFault['mode'] },
  random: Random,
): Patient | null {
  for (let tries = 0; tries < 40; tries++) {
    const fault = plantFault(circuit, site, mode, random.next)
    const vehicle = new Vehicle(
      model.network,
      {
        partFactor: () => 0.95 + 0.1 * random.next(),
        restingVolts: 11.8 + random.next(),
        chargingVolts: 13.5 + 1.3 * random.next(),
      },
      fault,
    )
    if (!vehicle.shows()) continue
    return { fault, vehicle, sites: [site, ...(fault.other ? [`wire:${fault.other}`] : [])] }
  }
  return null
}
