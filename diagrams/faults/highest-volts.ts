import type { Circuit } from '../document/circuit-schema'
import { nominalBatteryVolts } from '../solver/constants'
import { chargingRange, restingRange } from './battery-range'

/** The highest volts that a source of the circuit can bring up, the battery at the top of its range. */
export function highestVolts(circuit: Circuit, charging: boolean): number {
  const scale = (charging ? chargingRange : restingRange).high
  let most = 0
  let drawn = 0
  for (const node of circuit.nodes) {
    if (node.kind === 'battery' || node.kind === 'feed') drawn = Math.max(drawn, node.volts)
    if (node.kind === 'module')
      for (const { circuit: inside } of node.pins)
        if (inside.type === 'pull-up' || inside.type === 'source') most = Math.max(most, inside.volts)
  }
  // A circuit without a source of its own may still carry a stray one.
  return Math.max(most, (drawn || nominalBatteryVolts) * scale)
}
