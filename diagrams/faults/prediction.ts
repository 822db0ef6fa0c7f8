import type { Probe } from '../document/reading-schema'
import {
  at,
  batteryVoltsAt,
  branchAmps,
  fixedVoltsAt,
  ownShare,
  spreadOfFault,
  theveninOhms,
  unitCurrentIn,
  unitOfFault,
  unitSiemensOf,
  voltsBetween,
  type Case,
  type Settled,
} from '../solver/case'
import { deadVolts, voltmeterOhms } from '../solver/constants'

/**
 * What one faulted, settled network holds ready for one reading, as a function of the battery:
 * at scale s (battery volts over 12.6) the reading's quantity is s·battery + fixed, and real parts,
 * each within 5 % of the drawing, keep it within s·reachBattery + reachFixed of that.
 */
export interface Prediction {
  battery: number
  fixed: number
  reachBattery: number
  reachFixed: number
  /** Standard deviation that the same tolerances cause, taken as independent and evenly spread. */
  spread: number
  /** An ohms reading with a source on the circuit: the figure means nothing. */
  live: boolean
}

const tolerance = 0.05
/** First-order bounds grow by this: what is second order in 5 % stays below a quarter (tested on corners of the box). */
const secondOrder = 1.25

/** Quantity of a reading: volts under the meter, ohm, amperes, volts over a load's element, volts of an input. */
export function predict(given: Case, settled: Settled, probe: Probe): Prediction {
  let predictor = predictors.get(probe)
  if (!predictor) predictors.set(probe, (predictor = new Predictor(probe)))
  return predictor.predict(given, settled)
}

const predictors = new WeakMap<Probe, Predictor>()
const nothing: Prediction = { battery: 0, fixed: 0, reachBattery: 0, reachFixed: 0, spread: 0, live: false }

/** Predicts one reading for many faults; what they share is worked out once per base network. */
export class Predictor {
  constructor(private readonly probe: Probe) {}

  predict(given: Case, settled: Settled): Prediction {
    const { probe } = this
    const { network } = given.study
    switch (probe.kind) {
      case 'volts':
        return underMeter(settled, network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!)
      case 'ohms':
        return ohms(settled, network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!)
      case 'amps':
        return predictAmps(given, settled, network.branchIndex.get(`wire:${probe.wire}/from`)!)
      case 'works': {
        const load = network.loads.find((l) => l.node === probe.node)!
        if (given.alteration.forced.idle.has(load.node)) return nothing
        return overElement(given, settled, load.branch)
      }
      case 'sees': {
        const input = network.inputs.find((i) => i.point === probe.pin)!
        return volts(settled, input.inner, input.innerGround)
      }
    }
  }
}

function ohms(settled: Settled, a: number, b: number): Prediction {
  const value = theveninOhms(settled, a, b)
  return {
    battery: 0,
    fixed: value,
    reachBattery: 0,
    // Resistances between two points scale with the parts: exact, no second order.
    reachFixed: tolerance * value,
    spread: (tolerance / Math.sqrt(3)) * 0.7 * value,
    live: Math.abs(voltsBetween(settled, a, b)) > deadVolts / 2,
  }
}

function volts(settled: Settled, a: number, b: number): Prediction {
  const reach = reachOf(settled, a, b)
  return {
    battery: batteryVoltsAt(settled, a) - batteryVoltsAt(settled, b),
    fixed: fixedVoltsAt(settled, a) - fixedVoltsAt(settled, b),
    reachBattery: reach.reachBattery,
    reachFixed: reach.reachFixed,
    spread: reach.spread,
    live: false,
  }
}

/** The voltmeter's 10 Mohm divides what stands at its leads. */
function underMeter(settled: Settled, a: number, b: number): Prediction {
  const open = volts(settled, a, b)
  const part = voltmeterOhms / (voltmeterOhms + theveninOhms(settled, a, b))
  const partReach = secondOrder * tolerance * part * (1 - part)
  return {
    battery: open.battery * part,
    fixed: open.fixed * part,
    reachBattery: open.reachBattery * part + Math.abs(open.battery) * partReach,
    reachFixed: open.reachFixed * part + Math.abs(open.fixed) * partReach,
    spread: open.spread * part,
    live: false,
  }
}

/** Volts over a load's own element; a fault inside the part, in series, takes its share. */
function overElement(given: Case, settled: Settled, branch: number): Prediction {
  const { a, b } = given.study.network.branches[branch]!
  const whole = volts(settled, a, b)
  const share = ownShare(settled, branch)
  const shareReach = secondOrder * tolerance * share * (1 - share)
  return {
    battery: whole.battery * share,
    fixed: whole.fixed * share,
    reachBattery: whole.reachBattery * share + Math.abs(whole.battery) * shareReach,
    reachFixed: whole.reachFixed * share + Math.abs(whole.fixed) * shareReach,
    spread: whole.spread * share,
    live: false,
  }
}

/** Amperes from a to b inside a branch. */
export function predictAmps(given: Case, settled: Settled, branch: number): Prediction {
  const { base } = settled.located
  const { a, b } = given.study.network.branches[branch]!
  const altered = settled.located.branch === branch
  const siemens = altered ? settled.siemens : base.conductance[branch]!
  const over = volts(settled, a, b)
  const battery = altered ? settled.throughBattery : siemens * (over.battery - base.emfBattery[branch]!)
  const fixed = altered ? settled.throughFixed : siemens * (over.fixed - base.emfFixed[branch]!)
  // The branch's own resistance also sets its current directly; bounded by the whole of it.
  const own = secondOrder * tolerance * Math.max(0, 1 - siemens * theveninOhms(settled, a, b))
  return {
    battery,
    fixed,
    reachBattery: siemens * over.reachBattery + own * Math.abs(battery),
    reachFixed: siemens * over.reachFixed + own * Math.abs(fixed),
    spread: siemens * over.spread,
    live: false,
  }
}

/**
 * Reach of the tolerances by the adjoint: dv/d ln R(k) = i(k)·y(k), with i the current of branch k
 * and y its volts when one ampere flows between the leads. Only branches that such an ampere, or one
 * through the fault's place, moves at all are gone through.
 */
function reachOf(
  settled: Settled,
  a: number,
  b: number,
): Pick<Prediction, 'reachBattery' | 'reachFixed' | 'spread'> {
  const { located, scale, ampsBattery, ampsFixed } = settled
  const unitSiemens = unitSiemensOf(settled)
  const { base } = located
  const lead = base.spreadOf(a, b)
  const fault = located.touches ? spreadOfFault(located) : null
  const z = fault && unitSiemens !== 0 ? unitOfFault(located) : null
  const amps = z ? unitSiemens * (at(z, a) - at(z, b)) : 0
  const ownFraction = located.branch < 0 ? 1 : located.ownOhms / (located.ownOhms + settled.severity)
  const { conductance } = base
  const currents = base.currents()
  let reachBattery = 0
  let reachFixed = 0
  let squares = 0
  const add = (k: number, y: number, dz: number) => {
    const moved = y - amps * dz
    if (moved === 0) return
    // Of an altered branch only its own resistance is uncertain; the severity is swept anyway.
    const altered = k === located.branch
    const weight = altered ? Math.abs(moved) * ownFraction : Math.abs(moved)
    const g = conductance[k]!
    const iBattery = altered ? settled.throughBattery : currents.battery[k]! - g * ampsBattery * dz
    const iFixed = altered ? settled.throughFixed : currents.fixed[k]! - g * ampsFixed * dz
    reachBattery += weight * Math.abs(iBattery)
    reachFixed += weight * Math.abs(iFixed)
    squares += (weight * (scale * iBattery + iFixed)) ** 2
  }
  const { branches, moves } = lead
  for (let i = 0; i < branches.length; i++) {
    const k = branches[i]!
    add(k, moves[k]!, fault ? fault.moves[k]! : 0)
  }
  if (fault && amps !== 0) for (const k of fault.branches) if (moves[k] === 0) add(k, 0, fault.moves[k]!)
  return {
    reachBattery: secondOrder * tolerance * reachBattery,
    reachFixed: secondOrder * tolerance * reachFixed,
    spread: (tolerance / Math.sqrt(3)) * Math.sqrt(squares),
  }
}

/**
 * By how much a reading moves for each branch's ln R, signed: dv/d ln R(k) = i(k)·y(k), and y(k)²/R(k) for ohms. Null
 * for what is no figure.
 */
export function sensitivities(given: Case, settled: Settled, probe: Probe): Float64Array | null {
  const { network } = given.study
  switch (probe.kind) {
    case 'volts':
      return movesBetween(
        settled,
        network.unknownOf.get(probe.red)!,
        network.unknownOf.get(probe.black)!,
        voltmeterOhms,
      )
    case 'ohms':
      return movesBetween(
        settled,
        network.unknownOf.get(probe.red)!,
        network.unknownOf.get(probe.black)!,
        null,
      )
    case 'amps': {
      const branch = network.branchIndex.get(`wire:${probe.wire}/from`)!
      const { a, b } = network.branches[branch]!
      const altered = settled.located.branch === branch
      const siemens = altered ? settled.siemens : settled.located.base.conductance[branch]!
      const moves = movesBetween(settled, a, b, Infinity)
      for (let k = 0; k < moves.length; k++) moves[k]! *= siemens
      moves[branch]! -= branchAmps(given, settled, branch) * (altered ? ownShare(settled, branch) : 1)
      return moves
    }
    default:
      return null
  }
}

/** Of volts between two unknowns under a meter of `meterOhms`, or with null of the ohms between them. */
function movesBetween(settled: Settled, a: number, b: number, meterOhms: number | null): Float64Array {
  const { located, scale } = settled
  const { base } = located
  const y = unitCurrentIn(settled, a, b)
  const moves = new Float64Array(base.network.branches.length)
  const part =
    meterOhms === null ? 1 : meterOhms === Infinity ? 1 : meterOhms / (meterOhms + at(y, a) - at(y, b))
  for (const k of base.network.tolerant) {
    if (base.conductance[k] === 0) continue
    const { a: from, b: to } = base.network.branches[k]!
    const moved = at(y, from) - at(y, to)
    if (moved === 0) continue
    const altered = k === located.branch
    const siemens = altered ? settled.siemens : base.conductance[k]!
    const own = altered ? ownShare(settled, k) : 1
    const amps = altered
      ? scale * settled.throughBattery + settled.throughFixed
      : siemens * (voltsBetween(settled, from, to) - scale * base.emfBattery[k]! - base.emfFixed[k]!)
    moves[k] = part * own * moved * (meterOhms === null ? siemens * moved : amps)
  }
  return moves
}
