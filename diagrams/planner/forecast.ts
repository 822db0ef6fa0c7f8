import type { Probe } from '../document/reading-schema'
import type { FaultModel } from '../faults/fault-model'
import { alterationKey, noAlteration } from '../solver/alteration'
import { at, branchAmps, Case, unitCurrent, voltsBetween, type Settled } from '../solver/case'
import { deadVolts } from '../solver/constants'
import { loadWorks } from '../solver/operating-point'
import { Study, type Base } from '../solver/study'
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
        return Number.NaN
    }
  }

  /**
   * From the resistance R of the whole network and z of the network without the altered branch:
   * R + (z(a) − z(b))²·(g₀ − g) / ((1 + g₀·L)(1 + g·L)), g₀ and g the branch before and after.
   */
  private ohms(settled: Settled, i: number): number {
    const [a, b] = this.leads[i]!
    if (Math.abs(voltsBetween(settled, a, b)) > deadVolts) return Number.NaN
    const { located, siemens } = settled
    const whole = this.wholeOhms(located.base)[i]!
    if (located.z === null) return whole
    const before = located.branch >= 0 ? 1 / located.ownOhms : 0
    const moved = at(located.z, a) - at(located.z, b)
    const L = located.loopOhms
    return Math.max(0, whole + (moved * moved * (before - siemens)) / ((1 + before * L) * (1 + siemens * L)))
  }

  private wholeOhms(base: Base): Float64Array {
    let found = this.baseOhms.get(base)
    if (!found) {
      found = Float64Array.from(this.leads, ([a, b], i) => {
        if (this.probes[i]!.kind !== 'ohms') return 0
        const y = unitCurrent(this.study.network.size, base.factor, a, b)
        return at(y, a) - at(y, b)
      })
      this.baseOhms.set(base, found)
    }
    return found
  }
}
