import type { Probe } from '../document/reading-schema'
import {
  at,
  batteryVoltsAt,
  fixedVoltsAt,
  ownShare,
  unitCurrentIn,
  voltsBetween,
  type Case,
  type Settled,
} from '../solver/case'
import { deadVolts, voltmeterOhms } from '../solver/constants'
import type { Network } from '../solver/network'

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
  const { network } = given.study
  switch (probe.kind) {
    case 'volts': {
      const [a, b] = [network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!]
      return underMeter(given, settled, a, b)
    }
    case 'ohms': {
      const [a, b] = [network.unknownOf.get(probe.red)!, network.unknownOf.get(probe.black)!]
      const y = unitCurrentIn(settled, a, b)
      const ohms = Math.max(0, at(y, a) - at(y, b))
      return {
        battery: 0,
        fixed: ohms,
        reachBattery: 0,
        // Resistances between two points scale with the parts: exact, no second order.
        reachFixed: tolerance * ohms,
        spread: (tolerance / Math.sqrt(3)) * 0.7 * ohms,
        live: Math.abs(voltsBetween(settled, a, b)) > deadVolts / 2,
      }
    }
    case 'amps':
      return predictAmps(given, settled, network.branchIndex.get(`wire:${probe.wire}/from`)!)
    case 'works': {
      const load = network.loads.find((l) => l.node === probe.node)!
      if (given.alteration.forced.idle.has(load.node)) return nothing
      return overElement(given, settled, load.branch)
    }
    case 'sees': {
      const input = network.inputs.find((i) => i.point === probe.pin)!
      return between(given, settled, input.inner, input.innerGround)
    }
  }
}

const nothing: Prediction = { battery: 0, fixed: 0, reachBattery: 0, reachFixed: 0, spread: 0, live: false }

function between(given: Case, settled: Settled, a: number, b: number): Prediction {
  return linear(given, settled, unitCurrentIn(settled, a, b), a, b)
}

function linear(given: Case, settled: Settled, y: Float64Array, a: number, b: number): Prediction {
  const reach = reachOf(given.study.network, settled, y)
  return {
    battery: batteryVoltsAt(settled, a) - batteryVoltsAt(settled, b),
    fixed: fixedVoltsAt(settled, a) - fixedVoltsAt(settled, b),
    ...reach,
    live: false,
  }
}

/** The voltmeter's 10 Mohm divides what stands at its leads. */
function underMeter(given: Case, settled: Settled, a: number, b: number): Prediction {
  const y = unitCurrentIn(settled, a, b)
  const open = linear(given, settled, y, a, b)
  const ohms = Math.max(0, at(y, a) - at(y, b))
  const part = voltmeterOhms / (voltmeterOhms + ohms)
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
  const whole = between(given, settled, a, b)
  const share = ownShare(settled, branch)
  const shareReach = secondOrder * tolerance * share * (1 - share)
  return {
    ...whole,
    battery: whole.battery * share,
    fixed: whole.fixed * share,
    reachBattery: whole.reachBattery * share + Math.abs(whole.battery) * shareReach,
    reachFixed: whole.reachFixed * share + Math.abs(whole.fixed) * shareReach,
    spread: whole.spread * share,
  }
}

/** Amperes from a to b inside a branch. */
export function predictAmps(given: Case, settled: Settled, branch: number): Prediction {
  const { base } = settled.located
  const { a, b } = given.study.network.branches[branch]!
  const siemens = settled.located.branch === branch ? settled.siemens : base.conductance[branch]!
  const y = unitCurrentIn(settled, a, b)
  const volts = linear(given, settled, y, a, b)
  const battery = siemens * (volts.battery - base.emfBattery[branch]!)
  const fixed = siemens * (volts.fixed - base.emfFixed[branch]!)
  // The branch's own resistance also sets its current directly; bounded by the whole of it.
  const own = secondOrder * tolerance * Math.max(0, 1 - siemens * Math.max(0, at(y, a) - at(y, b)))
  return {
    battery,
    fixed,
    reachBattery: siemens * volts.reachBattery + own * Math.abs(battery),
    reachFixed: siemens * volts.reachFixed + own * Math.abs(fixed),
    spread: siemens * volts.spread,
    live: false,
  }
}

/**
 * Reach of the tolerances by the adjoint: dv/d ln R(k) = i(k)·y(k), with i the current of branch k
 * and y its volts when one ampere flows between the leads. O(branches).
 */
function reachOf(
  network: Network,
  settled: Settled,
  y: Float64Array,
): Pick<Prediction, 'reachBattery' | 'reachFixed' | 'spread'> {
  const { base } = settled.located
  const { scale } = settled
  let reachBattery = 0
  let reachFixed = 0
  let squares = 0
  for (let k = 0; k < network.branches.length; k++) {
    const branch = network.branches[k]!
    const conductance = base.conductance[k]!
    if (branch.exact || conductance === 0) continue
    const moved = at(y, branch.a) - at(y, branch.b)
    if (moved === 0) continue
    // Of an altered branch only its own resistance is uncertain; the severity is swept anyway.
    const altered = settled.located.branch === k
    const siemens = altered ? settled.siemens : conductance
    const share = altered ? ownShare(settled, k) : 1
    const iBattery =
      siemens * (batteryVoltsAt(settled, branch.a) - batteryVoltsAt(settled, branch.b) - base.emfBattery[k]!)
    const iFixed =
      siemens * (fixedVoltsAt(settled, branch.a) - fixedVoltsAt(settled, branch.b) - base.emfFixed[k]!)
    const weight = Math.abs(moved) * share
    reachBattery += weight * Math.abs(iBattery)
    reachFixed += weight * Math.abs(iFixed)
    squares += (weight * (scale * iBattery + iFixed)) ** 2
  }
  return {
    reachBattery: secondOrder * tolerance * reachBattery,
    reachFixed: secondOrder * tolerance * reachFixed,
    spread: (tolerance / Math.sqrt(3)) * Math.sqrt(squares),
  }
}
