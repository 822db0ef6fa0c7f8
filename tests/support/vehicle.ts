import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Probe, ReadingValue } from '@/diagrams/document/reading-schema'
import { noAlteration, withBlown, type Alteration } from '@/diagrams/solver/alteration'
import { blownFuses, fuseBranch } from '@/diagrams/solver/blown-fuses'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { Case, voltsAt, type Settled } from '@/diagrams/solver/case'
import { alterationOf, isShort, plainSeverity } from '@/diagrams/solver/fault-alteration'
import { readMeter } from '@/diagrams/solver/meter'
import type { Network } from '@/diagrams/solver/network'
import { inputSees, loadWorks } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { Study } from '@/diagrams/solver/study'

/** How one vehicle is off its drawing. */
export interface Deviations {
  /** What a part's resistance is multiplied by; asked once a part. */
  partFactor: () => number
  /** Volts of a 12.6 V battery at rest and while it is charged. */
  restingVolts: number
  chargingVolts: number
}

/**
 * A vehicle as it really is, with one fault in it or none: every resistance but contacts off by its own
 * factor, parts that the document gives no figure for (fuses, switch and relay contacts) among them.
 * Solved by the product's solver, which is compared with ngspice elsewhere; many times faster than
 * measuring each reading afresh.
 */
export class Vehicle {
  private readonly resting: Network
  private readonly charging: Network
  private readonly restingScale: number
  private readonly chargingScale: number
  private readonly factorOf: (branch: string) => number
  private readonly alteration: Alteration
  private readonly severity: number
  private readonly cases = new Map<string, { given: Case; settled: Settled | null }>()
  private readonly driving: Study[]

  constructor(
    private readonly drawn: Network,
    deviations: Deviations,
    private readonly fault?: PlantedFault,
  ) {
    const factors = new Map<string, number>()
    const weak = fault?.mode === 'weak'
    this.factorOf = (branch: string): number => {
      // Both halves of a wire, both throws of a relay are one part.
      const part = branch.startsWith('pin:') ? branch : branch.replace(/\/.*$/, '')
      let factor = factors.get(part)
      if (factor === undefined) factors.set(part, (factor = deviations.partFactor()))
      return factor
    }
    this.restingScale = weak ? 1 : deviations.restingVolts / 12.6
    this.chargingScale = weak ? 1 : deviations.chargingVolts / 14.15
    this.resting = offBy(drawn, this.factorOf, this.restingScale)
    this.charging = offBy(drawn, this.factorOf, this.chargingScale)
    this.driving = drivingConditions(drawn).map((condition) => new Study(this.resting, condition))
    this.severity = fault ? (fault.volts ?? fault.ohms ?? plainSeverity(fault.mode)) : 0
    this.alteration = fault ? alterationOf(this.resting, fault) : noAlteration
    if (fault && isShort(fault.mode)) {
      const blown = blownFuses(this.resting, this.driving, this.alteration, this.severity)
      this.alteration = withBlown(this.alteration, blown.map(fuseBranch))
    }
  }

  /** What an exact meter shows, or null where the vehicle does not come to rest. */
  read(probe: Probe): ReadingValue | null {
    const key = JSON.stringify(probe.condition)
    let found = this.cases.get(key)
    if (!found) {
      const network = this.networkIn(probe.condition)
      const given = new Case(new Study(network, probe.condition), this.alteration)
      this.cases.set(key, (found = { given, settled: given.settle(this.severity) }))
    }
    return found.settled && readMeter(found.given, found.settled, probe)
  }

  private networkIn({ charging, added }: Condition): Network {
    if (added.length > 0)
      return offBy(
        buildNetwork(this.drawn.circuit, added),
        this.factorOf,
        charging ? this.chargingScale : this.restingScale,
      )
    return charging ? this.charging : this.resting
  }

  /** Whether the fault counts on this vehicle, by the page: a point moved by over 0.4 V, or a load or an input changed. */
  shows(): boolean {
    return this.driving.some((study) => {
      const whole = new Case(study, noAlteration)
      const good = whole.settle(0)
      if (!good) return false
      const given = new Case(study, this.alteration)
      const bad = given.settle(this.severity)
      if (!bad) return true
      const { network } = study
      for (const unknown of network.unknownOf.values())
        if (unknown >= 0 && Math.abs(voltsAt(good, unknown) - voltsAt(bad, unknown)) > 0.4) return true
      return (
        network.loads.some((_, i) => loadWorks(whole, good, i) !== loadWorks(given, bad, i)) ||
        network.inputs.some((_, i) => inputSees(whole, good, i) !== inputSees(given, bad, i))
      )
    })
  }
}

/** The drawing itself, as a vehicle. */
export const asDrawn: Deviations = { partFactor: () => 1, restingVolts: 12.6, chargingVolts: 14.15 }

function offBy(drawn: Network, factorOf: (branch: string) => number, scale: number): Network {
  return {
    ...drawn,
    branches: drawn.branches.map((branch) => {
      const factor = branch.exact ? 1 : factorOf(branch.name)
      const supply = branch.supply === 'battery' ? scale : 1
      return {
        ...branch,
        ohms: (setting) => factor * branch.ohms(setting),
        emf: (setting) => supply * branch.emf(setting),
      }
    }),
  }
}

function drivingConditions(network: Network): Condition[] {
  return controlCombinations(network.circuit, 256).map((controls) => ({ ...restCondition, controls }))
}
