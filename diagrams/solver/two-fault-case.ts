import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import type { Probe, ReadingValue } from '../document/reading-schema'
import { withBlown } from './alteration'
import { blownFuses, drivingStudies, fuseBranch } from './blown-fuses'
import { buildNetwork } from './build-network'
import { Case } from './case'
import { alterationOf, isShort, plainSeverity } from './fault-alteration'
import type { FaultedCase } from './faulted-case'
import { besides, faultHolder } from './held-fault'
import { readMeter } from './meter'
import type { PlantedFault } from './planted-fault'
import { Study } from './study'

export type TwoFaults = readonly [PlantedFault, PlantedFault]

/**
 * The circuit in a condition with two faults of different places in it, and the fuses the two have
 * blown together: a short behind an open blows nothing. The faults must exist in the circuit.
 */
export function openTwoFaultCase(circuit: Circuit, condition: Condition, faults: TwoFaults): FaultedCase {
  // A weak battery cannot be held.
  const [held, swept] = faults[0].mode === 'weak' ? [faults[1], faults[0]] : faults
  const severity = severityOf(swept)
  const on = (network: ReturnType<typeof buildNetwork>) => {
    const first = faultHolder(network, alterationOf(network, held))(severityOf(held))
    return { network: first.network, alteration: besides(first, alterationOf(network, swept)) }
  }
  const plain = on(buildNetwork(circuit))
  const blown =
    isShort(held.mode) || isShort(swept.mode)
      ? blownFuses(plain.network, drivingStudies(plain.network), plain.alteration, severity)
      : []
  const here = condition.added.length === 0 ? plain : on(buildNetwork(circuit, condition.added))
  const study = new Study(here.network, condition)
  return { given: new Case(study, withBlown(here.alteration, blown.map(fuseBranch))), severity, blown }
}

/** What an exact meter shows with two faults in the circuit; null when the circuit does not come to rest. */
export function measureTwoFaults(circuit: Circuit, probe: Probe, faults: TwoFaults): ReadingValue | null {
  const { given, severity } = openTwoFaultCase(circuit, probe.condition, faults)
  const settled = given.settle(severity)
  return settled && readMeter(given, settled, probe)
}

function severityOf(fault: PlantedFault): number {
  if (fault.mode === 'weak') return fault.volts ?? plainSeverity('weak')
  return fault.ohms ?? plainSeverity(fault.mode)
}
