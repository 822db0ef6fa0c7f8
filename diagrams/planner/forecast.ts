import type { Probe } from '../document/reading-schema'
import type { FaultModel } from '../faults/fault-model'
import { alterationKey, noAlteration } from '../solver/alteration'
import { at, branchAmps, Case, unitOfFault, unitSiemensOf, voltsBetween, type Settled } from '../solver/case'
import { deadVolts } from '../solver/constants'
import { inputSees, loadWorks } from '../solver/operating-point'
import type { Base } from '../solver/base'
import { Study } from '../solver/study'
import type { CandidateSet } from './candidates'
import type { Particle } from './particles'

/**
 * Stands in for the voltmeter while many readings are weighed at once: 100 Mohm from every unknown
 * drains what floats and moves what is driven by less than the meter can show.
 */
const planningLeakSiemens = 1e-8

/**
 * What every particle foretells for every probe of a condition: one row a probe, one column a
 * particle. NaN where nothing can be said. Loads give 1 or 0; ohms may be Infinity.
 */
export function forecast(
  model: FaultModel,
  set: CandidateSet,
  particles: readonly Particle[],
): Float64Array[] {
  const { network } = model
  const dead = !set.condition.battery
  const study = dead
    ? new Study(network, set.condition)
    : new Study(network, set.condition, planningLeakSiemens)
  const rows = set.probes.map(() => new Float64Array(particles.length))
  const reader = new ProbeReader(study, set.probes)
  let given = new Case(study, noAlteration)
  let key = alterationKey(noAlteration)
  let of: Particle['hypothesis'] = null
  particles.forEach((particle, p) => {
    if (particle.hypothesis !== of) {
      of = particle.hypothesis
      const alteration = of ? of.alteration(network) : noAlteration
      // Neighbours in the list often change the same branch.
      if (alterationKey(alteration) !== key) given = new Case(study, alteration)
      key = alterationKey(alteration)
    }
    const settled = given.settle(particle.severity)
    for (let i = 0; i < rows.length; i++) rows[i]![p] = settled ? reader.read(given, settled, i) : Number.NaN
  })
  return rows
}

class ProbeReader {
  private readonly leads: (readonly [number, number])[]
  private readonly branches: number[]
  private readonly loads: number[]
  private readonly inputs: number[]
  /** Thevenin resistance of every ohms probe in each base network, the fault not in it. */
  private readonly baseOhms = new WeakMap<Base, Float64Array>()

  constructor(
    private readonly study: Study,
    private readonly probes: readonly Probe[],
  ) {
    const { network } = study
    this.leads = probes.map((probe) =>
      probe.kind === 'volts' || probe.kind === 'ohms'
        ? [network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!]
        : [-1, -1],
    )
    this.branches = probes.map((probe) =>
      probe.kind === 'amps' ? network.branchIndex.get(`wire:${probe.wire}/from`)! : -1,
    )
    this.loads = probes.map((probe) =>
      probe.kind === 'works' ? network.loads.findIndex((l) => l.node === probe.node) : -1,
    )
    this.inputs = probes.map((probe) =>
      probe.kind === 'sees' ? network.inputs.findIndex((input) => input.point === probe.pin) : -1,
    )
  }

  read(given: Case, settled: Settled, i: number): number {
    switch (this.probes[i]!.kind) {
      case 'volts':
        return voltsBetween(settled, ...this.leads[i]!)
      case 'ohms':
        return this.ohms(settled, i)
      case 'amps':
        return branchAmps(given, settled, this.branches[i]!)
      case 'works':
        return loadWorks(given, settled, this.loads[i]!) ? 1 : 0
      case 'sees':
        return inputSees(given, settled, this.inputs[i]!) === 'high' ? 1 : 0
    }
  }

  /** From the resistance of the whole network and the volts that one ampere through the fault's place adds. */
  private ohms(settled: Settled, i: number): number {
    const [a, b] = this.leads[i]!
    if (Math.abs(voltsBetween(settled, a, b)) > deadVolts) return Number.NaN
    const { located } = settled
    const whole = this.wholeOhms(located.base)[i]!
    if (!located.touches) return whole
    const z = unitOfFault(located)
    const moved = at(z, a) - at(z, b)
    return Math.max(0, whole - unitSiemensOf(settled) * moved * moved)
  }

  private wholeOhms(base: Base): Float64Array {
    let found = this.baseOhms.get(base)
    if (!found) {
      found = Float64Array.from(this.leads, ([a, b], i) => {
        if (this.probes[i]!.kind !== 'ohms') return 0
        const y = base.unitOnce(a, b)
        return at(y, a) - at(y, b)
      })
      this.baseOhms.set(base, found)
    }
    return found
  }
}
