import type { Alteration } from './alteration'
import { overPairs, spreadOver, type Base, type Spread } from './base'
import { nominalBatteryVolts } from './constants'
import type { States, Study } from './study'
import { openUnit, takeOut } from './taken-out'

/**
 * One state of a faulted network, ready for every severity.
 *
 * The fault changes one branch or adds one between p and q. With z the volts for one ampere from q
 * to p, the volts are those of the base less some amperes times z.
 *
 * In series with a branch of own resistance r, severity s: with R and V the ohms and volts between p
 * and q once the branch is taken out, it carries i = (V − E)/(r + s + R), and the base
 * lacks −i·s/(r + R). R, V and z are those of the network with the branch taken out, from sums of
 * positive numbers (`takeOut`), so nothing cancels, also where the branch is the only way and the
 * rest floats. Across p and q: i = V/(s + R), with V, R and z of the base itself.
 */
export interface Located {
  base: Base
  /** False where the fault touches nothing here: base and located are one. */
  touches: boolean
  p: number
  q: number
  /** The altered branch, or −1 for an added one. */
  branch: number
  /** Ohm of the altered branch itself; 0 for a short. */
  ownOhms: number
  /** R, ohm. Not a number until it is asked for. */
  loopOhms: number
  /** z at p and at q. */
  atP: number
  atQ: number
  /** V − E from the battery's sources and from fixed ones. */
  drivenBattery: number
  drivenFixed: number
  /** Volts of every watched pair in the base, and what one ampere from q to p adds. */
  watchedBattery: Float64Array
  watchedFixed: Float64Array
  watchedUnit: Float64Array | null
  /** z and what it moves, once they have been asked for. */
  z: Float64Array | null
  spread: Spread | null
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
  throughBattery: number
  throughFixed: number
  /** Amperes that the base lacks between p and q. */
  ampsBattery: number
  ampsFixed: number
}

/** A study with one fault in it. Settles for any severity; factorisations are shared between severities. */
export class Case {
  private readonly located = new Map<States, Located>()
  /** Every state passed through in the last settling, in order, for fuses that a chatter would blow. */
  passed: Settled[] = []

  constructor(
    readonly study: Study,
    readonly alteration: Alteration,
  ) {}

  locate(given: States): Located {
    let found = this.located.get(given)
    if (!found) {
      const states = this.study.same(given)
      found = this.located.get(states) ?? locate(this.study, this.alteration, states)
      this.located.set(states, found)
    }
    return found
  }

  scaleFor(severity: number): number {
    return this.alteration.weak ? severity / nominalBatteryVolts : this.study.nominalScale
  }

  /** Forgets what is as large as the network and can be worked out again. */
  releaseUnit() {
    for (const located of this.located.values()) {
      located.z = null
      located.spread = null
    }
  }

  /** Solves with the parts held in the given states. */
  solve(states: States, severity: number, scale: number): Settled {
    return settledAt(this.locate(states), states, severity, scale)
  }

  /**
   * Lets relays, modules and diodes find their state, from everything asleep and released.
   * Null when they never come to rest. `reluctance` multiplies the volts that relays and modules
   * ask for: what real parts, a little off the drawing, might do.
   */
  settle(severity: number, scale = this.scaleFor(severity), reluctance = 1): Settled | null {
    const { network } = this.study
    let states = this.study.atRest()
    const seen: States[] = []
    this.passed = []
    for (;;) {
      const solved = this.settleDiodes(states, severity, scale)
      if (!solved) return null
      this.passed.push(solved)
      if (network.relays.length === 0 && network.modules.length === 0) return solved
      const next = this.nextStates(solved, reluctance)
      if (next === null) return solved
      if (seen.includes(next)) return null
      seen.push(next)
      states = next
    }
  }

  /** What relays and modules do in these volts; null when they stay as they are. */
  private nextStates(solved: Settled, reluctance: number): States | null {
    const { network } = this.study
    const { states } = solved
    let relays: boolean[] | null = null
    for (let i = 0; i < network.relays.length; i++) {
      const pulledIn = coilVolts(this, solved, i) >= reluctance * network.relays[i]!.pullIn
      if (pulledIn !== states.relays[i]) (relays ??= states.relays.slice())[i] = pulledIn
    }
    let modules: boolean[] | null = null
    let supply = network.relays.length + network.diodes.length
    for (let i = 0; i < network.modules.length; i++) {
      const { node, supplies, runsFrom } = network.modules[i]!
      let awake = this.study.condition.battery && !this.alteration.forced.deadModules.has(node)
      for (let pin = 0; pin < supplies.length; pin++, supply++)
        awake &&= watchedVolts(solved, supply) >= reluctance * runsFrom
      if (awake !== states.modules[i]) (modules ??= states.modules.slice())[i] = awake
    }
    if (!relays && !modules) return null
    return this.study.same({
      relays: relays ?? states.relays,
      modules: modules ?? states.modules,
      diodes: states.diodes,
    })
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
      const wrong = this.wrongDiode(solved)
      if (wrong < 0) break
      const flipped = solved.states.diodes.slice()
      flipped[wrong] = !flipped[wrong]
      solved = this.solve(this.study.same({ ...solved.states, diodes: flipped }), severity, scale)
    }
    return solved
  }

  private wrongDiode(solved: Settled): number {
    const { network, condition } = this.study
    for (let i = 0; i < network.diodes.length; i++) {
      const on = solved.states.diodes[i]!
      // With the battery off nothing drives a diode.
      if (!condition.battery) {
        if (on) return i
        continue
      }
      const { volts: from } = network.diodes[i]!
      const volts = diodeVolts(this, solved, i)
      // A hair of slack on either side, so that rounding cannot make one flicker.
      if (on ? volts < from - 1e-9 : volts > from + 1e-9) return i
    }
    return -1
  }
}

function locate(study: Study, alteration: Alteration, states: States): Located {
  const { network } = study
  const base = study.base(states, alteration.forced)
  for (const branch of alteration.series) {
    if (base.conductance[branch] === 0) continue
    const { a, b } = network.branches[branch]!
    const open = takeOut(base, branch, network.watchedPivots)
    const located = placed(base, a, b, branch)
    located.ownOhms = 1 / base.conductance[branch]!
    located.loopOhms = open.ohms
    located.drivenBattery = open.voltsBattery - base.emfBattery[branch]!
    located.drivenFixed = open.voltsFixed - base.emfFixed[branch]!
    located.atP = at(open.unit, a)
    located.atQ = at(open.unit, b)
    located.watchedUnit = overPairs(network, open.unit)
    return located
  }
  if (alteration.shunt) {
    const [p, q] = alteration.shunt
    const located = placed(base, p, q, -1)
    located.drivenBattery = at(base.voltsBattery, p) - at(base.voltsBattery, q)
    located.drivenFixed = at(base.voltsFixed, p) - at(base.voltsFixed, q)
    return located
  }
  return { ...placed(base, -1, -1, -1), touches: false }
}

function placed(base: Base, p: number, q: number, branch: number): Located {
  const watched = base.watched()
  return {
    base,
    touches: true,
    p,
    q,
    branch,
    ownOhms: 0,
    loopOhms: Number.NaN,
    drivenBattery: 0,
    drivenFixed: 0,
    atP: 0,
    atQ: 0,
    watchedBattery: watched.battery,
    watchedFixed: watched.fixed,
    watchedUnit: null,
    z: null,
    spread: null,
  }
}

/** Below this nothing drives a short, volts: it changes nothing, and what an ampere through it would do is not asked. */
const drivenFrom = 1e-13

/** R of a located fault, ohm. Of a short it is worked out when first asked for: most lie between places that stand alike. */
function loopOhmsOf(located: Located): number {
  if (Number.isNaN(located.loopOhms)) {
    const unit = located.base.unitAt(located.p, located.q)
    located.loopOhms = Math.max(0, unit.atA - unit.atB)
    located.atP = unit.atA
    located.atQ = unit.atB
    located.watchedUnit = unit.watched
  }
  return located.loopOhms
}

/** A base as it is, no fault in it, at the battery's drawn volts. */
export function untouched(base: Base, states: States): Settled {
  return settledAt({ ...placed(base, -1, -1, -1), touches: false }, states, 0, 1)
}

function settledAt(located: Located, states: States, severity: number, scale: number): Settled {
  const { touches, branch, ownOhms, drivenBattery, drivenFixed } = located
  const driven =
    touches && (branch >= 0 || Math.abs(drivenBattery) > drivenFrom || Math.abs(drivenFixed) > drivenFrom)
  const R = driven ? loopOhmsOf(located) : 0
  const around = driven ? 1 / (ownOhms + severity + R) : 0
  const lacks = branch < 0 ? 1 : -severity / (ownOhms + R)
  const throughBattery = drivenBattery * around
  const throughFixed = drivenFixed * around
  return {
    states,
    located,
    siemens: touches ? 1 / (ownOhms + severity) : 0,
    severity,
    scale,
    throughBattery,
    throughFixed,
    ampsBattery: lacks * throughBattery,
    ampsFixed: lacks * throughFixed,
  }
}

/** Siemens κ with which volts y for one ampere from b to a follow from the base's: y − κ·(z(a) − z(b))·z. */
export function unitSiemensOf({ located, severity }: Settled): number {
  if (!located.touches) return 0
  const { branch, ownOhms } = located
  const R = loopOhmsOf(located)
  return (branch < 0 ? 1 : -severity / (ownOhms + R)) / (ownOhms + severity + R)
}

/** The furthest that a fault moves any unknown of its base, volts: it is at the fault's own ends that the most moves. */
export function furthestMove({ located, scale, ampsBattery, ampsFixed }: Settled): number {
  const amps = scale * ampsBattery + ampsFixed
  return amps === 0 ? 0 : Math.abs(amps) * Math.max(Math.abs(located.atP), Math.abs(located.atQ))
}

/** z of a located fault: volts per unknown for one ampere from q to p, an altered branch taken out. Not to be changed. */
export function unitOfFault(located: Located): Float64Array {
  return (located.z ??=
    located.branch < 0 ? located.base.unitOnce(located.p, located.q) : openUnit(located.base, located.branch))
}

/** What one ampere through the fault's place moves. */
export function spreadOfFault(located: Located): Spread {
  return (located.spread ??= spreadOver(located.base, unitOfFault(located)))
}

/** Volts per unknown of a settled network for one ampere from b to a: the adjoint of measuring a against b. Not to be changed. */
export function unitCurrentIn(settled: Settled, a: number, b: number): Float64Array {
  const { located } = settled
  const unitSiemens = unitSiemensOf(settled)
  const y = located.base.unit(a, b)
  if (unitSiemens === 0) return y
  const z = unitOfFault(located)
  const amps = unitSiemens * (at(z, a) - at(z, b))
  if (amps === 0) return y
  return y.map((value, i) => value - amps * z[i]!)
}

/** Thevenin resistance between two unknowns of a settled network, ohm. */
export function theveninOhms(settled: Settled, a: number, b: number): number {
  const { located } = settled
  const unitSiemens = unitSiemensOf(settled)
  const y = located.base.unit(a, b)
  const whole = at(y, a) - at(y, b)
  if (unitSiemens === 0) return Math.max(0, whole)
  const z = unitOfFault(located)
  const moved = at(z, a) - at(z, b)
  return Math.max(0, whole - unitSiemens * moved * moved)
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
  const volts = located.base.voltsBattery[unknown]!
  return ampsBattery === 0 ? volts : volts - ampsBattery * unitOfFault(located)[unknown]!
}

/** Volts that sources of their own volts alone cause: pull-ups, regulated outputs, diodes. */
export function fixedVoltsAt({ located, ampsFixed }: Settled, unknown: number): number {
  if (unknown < 0) return 0
  const volts = located.base.voltsFixed[unknown]!
  return ampsFixed === 0 ? volts : volts - ampsFixed * unitOfFault(located)[unknown]!
}

export function voltsBetween(settled: Settled, a: number, b: number): number {
  return voltsAt(settled, a) - voltsAt(settled, b)
}

/** Volts over one of the network's watched pairs. */
function watchedVolts({ located, scale, ampsBattery, ampsFixed }: Settled, pair: number): number {
  const unit = located.watchedUnit === null ? 0 : located.watchedUnit[pair]!
  return (
    scale * (located.watchedBattery[pair]! - ampsBattery * unit) +
    located.watchedFixed[pair]! -
    ampsFixed * unit
  )
}

/** Part of a branch's volts that stands over its own element, when the fault sits in series with it. */
export function ownShare(settled: Settled, branch: number): number {
  if (settled.located.branch !== branch) return 1
  return settled.located.ownOhms / (settled.located.ownOhms + settled.severity)
}

/** Volts over an element, a over b, a series fault inside its part not counted. */
export function elementVolts(given: Case, settled: Settled, branch: number): number {
  if (settled.located.branch === branch) return overAltered(settled)
  const { a, b } = given.study.network.branches[branch]!
  return voltsBetween(settled, a, b)
}

/** Volts over the altered branch's own element: its source and what its current drops in it. */
function overAltered({ located, scale, throughBattery, throughFixed }: Settled): number {
  const { base, branch, ownOhms } = located
  return (
    scale * (base.emfBattery[branch]! + throughBattery * ownOhms) +
    base.emfFixed[branch]! +
    throughFixed * ownOhms
  )
}

export function coilVolts(given: Case, settled: Settled, relay: number): number {
  const { coil, node } = given.study.network.relays[relay]!
  // An open or shorted coil never pulls in.
  if (given.alteration.forced.idle.has(node)) return 0
  return Math.abs(settled.located.branch === coil ? overAltered(settled) : watchedVolts(settled, relay))
}

export function diodeVolts(given: Case, settled: Settled, diode: number): number {
  const { network } = given.study
  const { branch } = network.diodes[diode]!
  return settled.located.branch === branch
    ? overAltered(settled)
    : watchedVolts(settled, network.relays.length + diode)
}

/** Amperes through a fuse. */
export function fuseAmps(given: Case, settled: Settled, fuse: number): number {
  const { network } = given.study
  const { branch } = network.fuses[fuse]!
  const { located, scale } = settled
  if (located.branch === branch) return scale * settled.throughBattery + settled.throughFixed
  return located.base.conductance[branch]! * watchedVolts(settled, network.firstWatchedFuse + fuse)
}

/** Least volts over a module's supplies, as parts of what it runs from. */
export function supplyParts(given: Case, settled: Settled, module: number): number[] {
  const { network } = given.study
  let first = network.relays.length + network.diodes.length
  for (let i = 0; i < module; i++) first += network.modules[i]!.supplies.length
  const { supplies, runsFrom } = network.modules[module]!
  return supplies.map((_, pin) => watchedVolts(settled, first + pin) / runsFrom)
}

/** Amperes from a to b inside a branch. */
export function branchAmps(given: Case, settled: Settled, branch: number): number {
  const { located, scale } = settled
  if (located.branch === branch) return scale * settled.throughBattery + settled.throughFixed
  const { base } = located
  const { a, b } = given.study.network.branches[branch]!
  const emf = scale * base.emfBattery[branch]! + base.emfFixed[branch]!
  return base.conductance[branch]! * (voltsBetween(settled, a, b) - emf)
}
