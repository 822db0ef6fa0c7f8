import { controlCombinations } from '@/diagrams/document/condition'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import { readingSchema, type Reading } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { plantFault } from '../../support/plant-fault'
import { seededRandom } from '../../support/random'
import { Vehicle } from '../../support/vehicle'

const readingCount = 10

/** Ten readings, five combinations of controls and the battery off, of a vehicle with a fault that shows. */
export function tenReadings(circuit: Circuit, seed: number): Reading[] {
  const random = seededRandom(seed)
  const network = buildNetwork(circuit)
  const conditions = [
    ...controlCombinations(circuit, 5).map((controls) => ({ ...restCondition, controls })),
    { ...restCondition, battery: false },
  ]
  const sets = candidateReadings(circuit, [], restCondition, { limit: 1000 })
  const pool = conditions.map((condition) => {
    const set = sets.find((one) => one.condition.battery === condition.battery)!
    return set.probes.map((probe) => ({ ...probe, condition }))
  })
  for (;;) {
    const site = random.pick(sitesOf(circuit))
    const fault = plantFault(circuit, site.id, random.pick(site.modes), random.next)
    const off = { partFactor: () => 0.95 + 0.1 * random.next(), restingVolts: 12.2, chargingVolts: 14 }
    const vehicle = new Vehicle(network, off, fault)
    if (!vehicle.shows()) continue
    const readings: Reading[] = []
    for (let i = 0; readings.length < readingCount; i++) {
      const probe = random.pick(pool[i % pool.length]!)
      const value = vehicle.read(probe)
      if (value !== null) readings.push(readingSchema.parse({ id: `r${i}`, ...probe, value }))
      if (i > 100) break
    }
    if (readings.length === readingCount) return readings
  }
}
