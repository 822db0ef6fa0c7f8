import { conditionKey } from '../document/condition'
import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import type { Probe, ReadingValue } from '../document/reading-schema'
import { neighbourWires, type Mode } from '../document/sites'
import { noAlteration, withBlown, type Alteration } from '../solver/alteration'
import { blownFuses, drivingStudies, fuseBranch } from '../solver/blown-fuses'
import { buildNetwork } from '../solver/build-network'
import { Case, type Settled } from '../solver/case'
import { alterationOf, isShort, plainSeverity } from '../solver/fault-alteration'
import { readMeter } from '../solver/meter'
import type { PlantedFault } from '../solver/planted-fault'
import { Study } from '../solver/study'

/** What was found: a place, how it failed, and how badly where that is known. */
export interface Finding {
  site: string
  mode: Mode
  ohms?: number | null
  other?: string | null
}

/** Severities that stand for a fault whose own is not known. */
const typical: Partial<Record<Mode, number[]>> = {
  resistive: [2, 50, 5000, 1e5],
  'short-to-ground': [0.05, 0.5],
  'short-to-supply': [0.05, 0.5],
  'short-to-wire': [0.05, 0.5],
  shorted: [0.05, 0.5],
}

/** The finding as faults that can be solved. */
export function faultsOfFinding(circuit: Circuit, { site, mode, ohms, other }: Finding): PlantedFault[] {
  const beside = mode === 'short-to-wire' ? (other ?? neighbourWires(circuit, site.slice(5))[0]) : undefined
  const severities = ohms ? [ohms] : (typical[mode] ?? [plainSeverity(mode)])
  return severities.map((severity) => ({
    site,
    mode,
    ...(mode === 'weak' ? { volts: severity } : { ohms: severity }),
    ...(beside === undefined ? {} : { other: beside }),
  }))
}

/** What the good circuit and a few faults show for any reading; each condition is solved once. */
export class ShownBy {
  private readonly networks = new Map<string, ReturnType<typeof buildNetwork>>()
  private readonly settled = new Map<string, { given: Case; settled: Settled | null }[]>()
  private readonly faults: { fault: PlantedFault; severity: number; blows: string[] }[]

  constructor(
    private readonly circuit: Circuit,
    faults: readonly PlantedFault[],
  ) {
    const network = this.networkWith([])
    const studies = drivingStudies(network)
    this.faults = faults.map((fault) => {
      const severity = fault.volts ?? fault.ohms ?? plainSeverity(fault.mode)
      const blows = isShort(fault.mode)
        ? blownFuses(network, studies, alterationOf(network, fault), severity)
        : []
      return { fault, severity, blows }
    })
  }

  /** Fuses that any of the faults has blown. */
  blown(): string[] {
    return [...new Set(this.faults.flatMap(({ blows }) => blows))]
  }

  good(probe: Probe): ReadingValue | null {
    return this.read(probe)[0]!
  }

  /** One value for each fault, in order. */
  faulty(probe: Probe): (ReadingValue | null)[] {
    return this.read(probe).slice(1)
  }

  private read(probe: Probe): (ReadingValue | null)[] {
    return this.casesIn(probe.condition).map(
      ({ given, settled }) => settled && readMeter(given, settled, probe),
    )
  }

  private casesIn(condition: Condition): { given: Case; settled: Settled | null }[] {
    const key = conditionKey(this.circuit, condition)
    let found = this.settled.get(key)
    if (!found) {
      const study = new Study(this.networkWith(condition.added), condition)
      const settle = (alteration: Alteration, severity: number) => {
        const given = new Case(study, alteration)
        return { given, settled: given.settle(severity) }
      }
      found = [
        settle(noAlteration, 0),
        ...this.faults.map(({ fault, severity, blows }) =>
          settle(withBlown(alterationOf(study.network, fault), blows.map(fuseBranch)), severity),
        ),
      ]
      this.settled.set(key, found)
    }
    return found
  }

  private networkWith(added: Condition['added']) {
    const key = JSON.stringify(added)
    let found = this.networks.get(key)
    if (!found) this.networks.set(key, (found = buildNetwork(this.circuit, added)))
    return found
  }
}
