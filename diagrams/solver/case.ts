import type { Alteration } from './alteration'
import { nominalBatteryVolts } from './constants'
import { solveInPlace, type Factor } from './factor'
import { stateKey, type Base, type States, type Study } from './study'

/**
 * One state of a faulted network, ready for every severity.
 *
 * For a series fault the branch is taken out and put back as a conductance g ≥ 0 between its ends
 * p and q; for a short g is added between p and q. With z the volts for one ampere from q to p and
 * R = z(p) − z(q), the branch carries i = g·(Vpq − E)/(1 + g·R) and v = v₀ − i·z. Both terms of the
 * denominator are positive, so nothing cancels, also on floating parts.
 */
export interface Located {
  base: Base
  /** The network without the altered branch; null where it follows from the whole one. */
  factor: Factor | null
  p: number
  q: number
  z: Float64Array | null
  loopOhms: number
  /** The altered branch, or −1. */
  branch: number
  /** Ohm of the altered branch itself; 0 for a short. */
  ownOhms: number
  emfBattery: number
  emfFixed: number
  voltsBattery: Float64Array
  voltsFixed: Float64Array
}

/** A faulted network with its parts settled; its volts are worked out where they are asked for. */
export interface Settled {
  states: States
  located: Located
  /** Siemens of the added or altered element; 0 where the fault touches nothing here. */
  siemens: number
  /** Ohm in series or across, as asked. */
  severity: number
  /** The battery's volts over those drawn. */
  scale: number
  /** Amperes through the altered or added element, from the battery's sources and from fixed ones. */
  ampsBattery: number
  ampsFixed: number
}

/** A study with one fault in it. Settles for any severity; factorisations are shared between severities. */
export class Case {
  private readonly located = new Map<string, Located>()
  /** Every state passed through in the last settling, in order, for fuses that a chatter would blow. */
  passed: Settled[] = []

  constructor(
    readonly study: Study,
    readonly alteration: Alteration,
  ) {}

  locate(states: States): Located {
    const key = stateKey(states)
    let found = this.located.get(key)
    if (!found) this.located.set(key, (found = locate(this.study, this.alteration, states)))
    return found
  }

  scaleFor(severity: number): number {
    return this.alteration.weak ? severity / nominalBatteryVolts : this.study.nominalScale
  }

  /** Solves with the parts held in the given states. */
  solve(states: States, severity: number, scale: number): Settled {
    const located = this.locate(states)
    const { z, loopOhms, p, q } = located
    const own = located.ownOhms + severity
    const siemens = z === null ? 0 : 1 / own
    const ampsFor = (volts: Float64Array, emf: number): number =>
      z === null ? 0 : (siemens * (at(volts, p) - at(volts, q) - emf)) / (1 + siemens * loopOhms)
    return {
      states,
      located,
      siemens,
      severity,
      scale,
      ampsBattery: ampsFor(located.voltsBattery, located.emfBattery),
      ampsFixed: ampsFor(located.voltsFixed, located.emfFixed),
    }
  }

  /**
   * Lets relays, modules and diodes find their state, from everything asleep and released.
   * Null when they never come to rest. `reluctance` multiplies the volts that relays and modules
   * ask for: what real parts, a little off the drawing, might do.
   */
  settle(severity: number, scale = this.scaleFor(severity), reluctance = 1): Settled | null {
    const { network, condition } = this.study
    let states = this.study.atRest()
    const seen = new Set<string>()
    this.passed = []
    for (;;) {
      const solved = this.settleDiodes(states, severity, scale)
      if (!solved) return null
      this.passed.push(solved)
      if (network.relays.length === 0 && network.modules.length === 0) return solved
      const next: States = {
        relays: network.relays.map(
          (_, i) => coilVolts(this, solved, i) >= reluctance * network.relays[i]!.pullIn,
        ),
        modules: network.modules.map(
          (module) =>
            condition.battery &&
            !this.alteration.forced.deadModules.has(module.node) &&
            module.supplies.every(
              (pin) => voltsBetween(solved, pin, module.innerGround) >= reluctance * module.runsFrom,
            ),
        ),
        diodes: solved.states.diodes,
      }
      const key = stateKey(next)
      if (key === stateKey(solved.states)) return solved
      if (seen.has(key)) return null
      seen.add(key)
      states = next
    }
  }

  /**
   * Diodes have one consistent state (a network of resistors and diodes is monotone); flip the first
   * that contradicts itself until none does (Murty, Note on a Bard-type scheme for solving the
   * complementarity problem, Opsearch 11, 1974).
   */
  settleDiodes(states: States, severity: number, scale: number): Settled | null {
    const { diodes } = this.study.network
    let solved = this.solve(states, severity, scale)
    for (let round = 0; diodes.length > 0; round++) {
      if (round > 50 + 20 * diodes.length) return null
      const wrong = diodes.findIndex((diode, i) => {
        const volts = elementVolts(this, solved, diode.branch)
        // With the battery off nothing drives a diode.
        if (!this.study.condition.battery) return solved.states.diodes[i]
        // A hair of slack on either side, so that rounding cannot make one flicker.
        return solved.states.diodes[i] ? volts < diode.volts - 1e-9 : volts > diode.volts + 1e-9
      })
      if (wrong < 0) break
      const flipped = solved.states.diodes.map((on, i) => (i === wrong ? !on : on))
      solved = this.solve({ ...solved.states, diodes: flipped }, severity, scale)
    }
    return solved
  }
}

function locate(study: Study, alteration: Alteration, states: States): Located {
  const { network } = study
  const base = study.base(states, alteration.forced)
  const untouched: Located = {
    base,
    factor: base.factor,
    p: -1,
    q: -1,
    z: null,
    loopOhms: 0,
    branch: -1,
    ownOhms: 0,
    emfBattery: 0,
    emfFixed: 0,
    voltsBattery: base.voltsBattery,
    voltsFixed: base.voltsFixed,
  }
  const branch = alteration.series.find((series) => base.conductance[series]! > 0)
  if (branch !== undefined) return withoutBranch(study, base, branch)
  if (alteration.shunt) {
    const [p, q] = alteration.shunt
    const z = unitCurrent(network.size, base.factor, p, q)
    return { ...untouched, p, q, z, loopOhms: at(z, p) - at(z, q) }
  }
  return untouched
}

/** Below this part of a branch's own conductance there is no other way round, and the shortcut would cancel. */
const otherWayFrom = 1e-5

/**
 * The network with one branch taken out. Where current has another way round, it follows from the
 * whole network: with z₁ the volts for one ampere through the whole from q to p, g the branch and
 * R₁ = z₁(p) − z₁(q), z = z₁/(1 − g·R₁), and its sources' volts gain i·z, i the branch's current. Where
 * the branch is the only way, 1 − g·R₁ would cancel, and on dead circuits the volts of what floats
 * would; then the network is factored again without it.
 */
function withoutBranch(study: Study, base: Base, branch: number): Located {
  const { network } = study
  const siemens = base.conductance[branch]!
  const { a, b } = network.branches[branch]!
  const common = {
    base,
    p: a,
    q: b,
    branch,
    ownOhms: 1 / siemens,
    emfBattery: base.emfBattery[branch]!,
    emfFixed: base.emfFixed[branch]!,
  }
  if (study.condition.battery) {
    const z = unitCurrent(network.size, base.factor, a, b)
    const left = 1 - siemens * (at(z, a) - at(z, b))
    if (left > otherWayFrom) {
      for (let i = 0; i < z.length; i++) z[i]! /= left
      const regained = (volts: Float64Array, emf: number): Float64Array => {
        const amps = siemens * (at(volts, a) - at(volts, b) - emf)
        return amps === 0 ? volts : volts.map((value, i) => value + amps * z[i]!)
      }
      return {
        ...common,
        factor: null,
        z,
        loopOhms: at(z, a) - at(z, b),
        voltsBattery: regained(base.voltsBattery, common.emfBattery),
        voltsFixed: regained(base.voltsFixed, common.emfFixed),
      }
    }
  }
  const factor = study.factorWithout(base.conductance, branch)
  const z = unitCurrent(network.size, factor, a, b)
  return {
    ...common,
    factor,
    z,
    loopOhms: at(z, a) - at(z, b),
    voltsBattery: study.solveSources(factor, base.conductance, base.emfBattery, branch),
    voltsFixed: study.solveSources(factor, base.conductance, base.emfFixed, branch),
  }
}

/** Volts per unknown for one ampere put in at p and taken out at q (−1 is chassis). */
export function unitCurrent(size: number, factor: Factor, p: number, q: number): Float64Array {
  const x = new Float64Array(size)
  if (p >= 0) x[p]! += 1
  if (q >= 0) x[q]! -= 1
  return p === q ? x : solveInPlace(factor, x)
}

/** Volts per unknown of a settled network for one ampere from b to a: the adjoint of measuring a against b. Not to be changed. */
export function unitCurrentIn(settled: Settled, a: number, b: number): Float64Array {
  const { located, siemens } = settled
  const y = unaltered(located, a, b)
  const { z, p, q, loopOhms } = located
  if (z === null) return y
  const amps = (siemens * (at(y, p) - at(y, q))) / (1 + siemens * loopOhms)
  return amps === 0 ? y : y.map((value, i) => value - amps * z[i]!)
}

/** The same for the network without the altered branch or added short; kept, since every severity asks. */
function unaltered(located: Located, a: number, b: number): Float64Array {
  const { base, factor, z, p, q, branch } = located
  const size = base.voltsBattery.length
  const key = a * (size + 1) + b
  if (factor !== null && factor !== base.factor)
    return kept(factor, key, () => unitCurrent(size, factor, a, b))
  const whole = kept(base.factor, key, () => unitCurrent(size, base.factor, a, b))
  if (factor !== null || z === null) return whole
  return kept(located, key, () => {
    const amps = base.conductance[branch]! * (at(whole, p) - at(whole, q))
    return amps === 0 ? whole : whole.map((value, i) => value + amps * z[i]!)
  })
}

const keptByOwner = new WeakMap<object, Map<number, Float64Array>>()

function kept(owner: object, key: number, find: () => Float64Array): Float64Array {
  let map = keptByOwner.get(owner)
  if (!map) keptByOwner.set(owner, (map = new Map()))
  let found = map.get(key)
  if (!found) map.set(key, (found = find()))
  return found
}

export function at(volts: Float64Array, unknown: number): number {
  return unknown < 0 ? 0 : volts[unknown]!
}

export function voltsAt(settled: Settled, unknown: number): number {
  return settled.scale * batteryVoltsAt(settled, unknown) + fixedVoltsAt(settled, unknown)
}

/** Volts that the battery's sources alone cause, at their drawn volts. */
export function batteryVoltsAt({ located, ampsBattery }: Settled, unknown: number): number {
  if (unknown < 0) return 0
  const volts = located.voltsBattery[unknown]!
  return ampsBattery === 0 ? volts : volts - ampsBattery * located.z![unknown]!
}

/** Volts that sources of their own volts alone cause: pull-ups, regulated outputs, diodes. */
export function fixedVoltsAt({ located, ampsFixed }: Settled, unknown: number): number {
  if (unknown < 0) return 0
  const volts = located.voltsFixed[unknown]!
  return ampsFixed === 0 ? volts : volts - ampsFixed * located.z![unknown]!
}

export function voltsBetween(settled: Settled, a: number, b: number): number {
  return voltsAt(settled, a) - voltsAt(settled, b)
}

/** Part of a branch's volts that stands over its own element, when the fault sits in series with it. */
export function ownShare(settled: Settled, branch: number): number {
  if (settled.located.branch !== branch) return 1
  return settled.located.ownOhms / (settled.located.ownOhms + settled.severity)
}

/** Volts over an element, a over b, a series fault inside its part not counted. */
export function elementVolts(given: Case, settled: Settled, branch: number): number {
  const { a, b } = given.study.network.branches[branch]!
  const volts = voltsBetween(settled, a, b)
  const share = ownShare(settled, branch)
  if (share === 1) return volts
  const emf = settled.scale * settled.located.emfBattery + settled.located.emfFixed
  return emf + (volts - emf) * share
}

export function coilVolts(given: Case, settled: Settled, relay: number): number {
  const { coil, node } = given.study.network.relays[relay]!
  // An open or shorted coil never pulls in.
  return given.alteration.forced.idle.has(node) ? 0 : Math.abs(elementVolts(given, settled, coil))
}

/** Amperes from a to b inside a branch. */
export function branchAmps(given: Case, settled: Settled, branch: number): number {
  const { base } = settled.located
  const { a, b } = given.study.network.branches[branch]!
  const siemens = settled.located.branch === branch ? settled.siemens : base.conductance[branch]!
  const emf = settled.scale * base.emfBattery[branch]! + base.emfFixed[branch]!
  return siemens * (voltsBetween(settled, a, b) - emf)
}
