import type { Problem } from '../document/check-circuit'
import { checkCondition } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { neighbourWires, sitesOf } from '../document/sites'
import { noAlteration, withBlown } from './alteration'
import { blownFuses, drivingStudies, fuseBranch } from './blown-fuses'
import { buildNetwork } from './build-network'
import { Case } from './case'
import { alterationOf, isShort, plainSeverity } from './fault-alteration'
import type { PlantedFault } from './planted-fault'
import { Study } from './study'

export interface FaultedCase {
  given: Case
  severity: number
  blown: string[]
}

/** The circuit in a condition, with a fault and the fuses it has blown, or why that cannot be. */
export function openCase(
  circuit: Circuit,
  condition: Condition,
  fault?: PlantedFault,
): { ok: true; value: FaultedCase } | { ok: false; problem: Problem } {
  const problem = checkCondition(circuit, condition, 'condition')[0] ?? (fault && checkFault(circuit, fault))
  if (problem) return { ok: false, problem }
  const study = new Study(buildNetwork(circuit, condition.added), condition)
  if (!fault) return { ok: true, value: { given: new Case(study, noAlteration), severity: 0, blown: [] } }
  const severity =
    fault.mode === 'weak' ? (fault.volts ?? plainSeverity('weak')) : (fault.ohms ?? plainSeverity(fault.mode))
  const alteration = alterationOf(study.network, fault)
  let blown: string[] = []
  if (isShort(fault.mode)) {
    const plain = condition.added.length === 0 ? study.network : buildNetwork(circuit)
    blown = blownFuses(plain, drivingStudies(plain), alterationOf(plain, fault), severity)
  }
  return {
    ok: true,
    value: { given: new Case(study, withBlown(alteration, blown.map(fuseBranch))), severity, blown },
  }
}

function checkFault(circuit: Circuit, fault: PlantedFault): Problem | undefined {
  const site = sitesOf(circuit).find((s) => s.id === fault.site)
  if (!site) return { path: 'fault.site', message: `place "${fault.site}" does not exist` }
  if (!site.modes.includes(fault.mode))
    return {
      path: 'fault.mode',
      message: `place "${fault.site}" cannot be ${fault.mode}, expected ${site.modes.join(', ')}`,
    }
  if (fault.other !== undefined && !neighbourWires(circuit, fault.site.slice(5)).includes(fault.other))
    return { path: 'fault.other', message: `wire "${fault.other}" does not lie beside ${fault.site}` }
  if (fault.wire !== undefined) {
    const end = `${fault.site.slice('part:'.length)}.s`
    const wire = circuit.wires.find((w) => w.id === fault.wire)
    if (wire?.from !== end && wire?.to !== end)
      return { path: 'fault.wire', message: `wire "${fault.wire}" does not end at splice ${fault.site}` }
  }
  // A short of no ohms at all, or a negative resistance, has no solution.
  if (fault.ohms !== undefined && !(isShort(fault.mode) ? fault.ohms > 0 : fault.ohms >= 0))
    return {
      path: 'fault.ohms',
      message: `${fault.ohms} ohm, expected ${isShort(fault.mode) ? 'more than 0' : '0 or more'}`,
    }
  if (fault.volts !== undefined && !(fault.volts >= 0))
    return { path: 'fault.volts', message: `${fault.volts} V, expected 0 or more` }
  return undefined
}
