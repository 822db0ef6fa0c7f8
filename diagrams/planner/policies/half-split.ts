import { restCondition } from '../../document/condition-schema'
import type { Probe } from '../../document/reading-schema'
import { probeKey } from '../../faults/fault-model'
import { refuseReading } from '../../solver/legal-reading'
import { walkCircuit } from './circuit-walk'
import { openedOhms } from './opened-ohms'
import { suspectsLeft, type Policy } from './policy'
import { usingConditions } from './using-conditions'

/**
 * What the trade teaches: count the places in question along the path, and measure volts to chassis
 * in the middle of them. First in the condition in which the circuit does most, then in the others;
 * when volts split no more, ohms across the middle with the battery off.
 */
export const halfSplit: Policy = (known) => {
  const { model, readings } = known
  const { circuit } = model
  const taken = new Set(readings.map((reading) => probeKey(circuit, reading)))
  const open = (probe: Probe) => !taken.has(probeKey(circuit, probe)) && !refuseReading(circuit, probe)
  const { stops, stepOf } = walkCircuit(circuit)
  const steps = suspectsLeft(known).map(stepOf)
  // How far each stop is from leaving as many places behind it as before it.
  const ranked = stops
    .map((stop) => {
      const behind = steps.filter((step) => step >= stop.step && step <= stop.last + 0.5).length
      return { stop, behind, off: Math.abs(2 * behind - steps.length) }
    })
    .toSorted((a, b) => a.off - b.off)
  const splitting = ranked.filter(({ behind }) => behind > 0 && behind < steps.length)
  for (const condition of usingConditions(circuit))
    for (const { stop } of splitting) {
      const probe: Probe = { kind: 'volts', red: stop.point, black: 'chassis', condition }
      if (open(probe)) return probe
    }
  const dead = { ...restCondition, battery: false }
  for (const { stop } of ranked) {
    const before = stops[stop.step - 1]
    const ends = before ? [before.point, 'chassis'] : ['chassis']
    for (const black of ends) {
      const probe: Probe = { kind: 'ohms', red: stop.point, black, condition: dead }
      if (open(probe)) return probe
    }
  }
  return openedOhms(known).find(open) ?? null
}
