import { restCondition } from '../../document/condition-schema'
import type { Probe } from '../../document/reading-schema'
import { probeKey } from '../../faults/fault-model'
import { refuseReading } from '../../solver/legal-reading'
import { walkCircuit } from './circuit-walk'
import { openedOhms } from './opened-ohms'
import { suspectsLeft, type Policy } from './policy'
import { usingConditions } from './using-conditions'

/**
 * From the feed to the load, point after point, volts to chassis; a leg in which nothing is in
 * question any more is passed over. Then the same in the other conditions, then ohms.
 */
export const walk: Policy = (known) => {
  const { model, readings } = known
  const { circuit } = model
  const taken = new Set(readings.map((reading) => probeKey(circuit, reading)))
  const open = (probe: Probe) => !taken.has(probeKey(circuit, probe)) && !refuseReading(circuit, probe)
  const { stops, stepOf } = walkCircuit(circuit)
  const steps = suspectsLeft(known).map(stepOf)
  const worthPassing = stops.filter((stop) =>
    steps.some((step) => step >= stop.step - 1 && step <= stop.last + 0.5),
  )
  for (const condition of usingConditions(circuit))
    for (const { point } of worthPassing) {
      const probe: Probe = { kind: 'volts', red: point, black: 'chassis', condition }
      if (open(probe)) return probe
    }
  const dead = { ...restCondition, battery: false }
  for (const [i, { point }] of stops.entries())
    for (const black of i > 0 ? [stops[i - 1]!.point, 'chassis'] : ['chassis']) {
      const probe: Probe = { kind: 'ohms', red: point, black, condition: dead }
      if (open(probe)) return probe
    }
  return openedOhms(known).find(open) ?? null
}
