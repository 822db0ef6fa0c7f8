import { positionsIn } from '../document/condition'
import type { Condition } from '../document/condition-schema'
import { leakSiemens, nominalBatteryVolts, nominalChargingVolts } from './constants'
import { factorise, solveInPlace, type Factor } from './factor'
import { nowhere, type Forced, type Network, type Setting } from './network'

/** Above this a source between two floating unknowns is solved by its loop, amperes of its Norton current. */
const loopFromAmps = 1

/** Which relays have pulled in, which modules are awake, which diodes conduct. */
export interface States {
  relays: boolean[]
  modules: boolean[]
  diodes: boolean[]
}

/** A network in one condition with its parts in one state: factored, and solved for its own sources. */
export interface Base {
  /** Siemens per branch; 0 where it does not conduct. */
  conductance: Float64Array
  /** Source volts per branch that follow the battery, and those that do not. */
  emfBattery: Float64Array
  emfFixed: Float64Array
  factor: Factor
  /** Volts per unknown from the battery's sources at their drawn volts, and from fixed sources. */
  voltsBattery: Float64Array
  voltsFixed: Float64Array
}

/** One circuit in one condition; factorisations are made once per state and kept. */
export class Study {
  private readonly bases = new Map<string, Base>()
  private readonly different: Base[] = []
  private readonly positions
  private readonly unplugged
  /** What the battery's volts are multiplied by when nothing is known of it. */
  readonly nominalScale: number

  constructor(
    readonly network: Network,
    readonly condition: Condition,
    /** Conductance of every unknown to chassis, siemens. */
    private readonly leak = leakSiemens,
  ) {
    this.positions = positionsIn(network.circuit, condition.controls)
    this.unplugged = new Set(condition.unplugged)
    this.nominalScale = condition.charging ? nominalChargingVolts / nominalBatteryVolts : 1
  }

  /** Everything asleep and released. */
  atRest(): States {
    const { relays, modules, diodes } = this.network
    return {
      relays: relays.map(() => false),
      modules: modules.map(() => false),
      diodes: diodes.map(() => false),
    }
  }

  /** Factors the conductances with branch `without` left out (−1: none). */
  factorWithout(conductance: Float64Array, without: number): Factor {
    return factorNetwork(this.network, conductance, without, this.leak)
  }

  /**
   * Volts per unknown that the given source volts cause, with branch `without` left out.
   *
   * A source becomes a current E·g put in at a and taken out at b. Between a battery's poles that is
   * hundreds of amperes in and out, whose rounding would put a floating harness off by a millivolt.
   * Such a source is left out instead: with z the volts for one ampere from b to a and
   * R = z(a) − z(b), it drives E/(1/g + R) round its loop, and v = z · E/(1/g + R).
   */
  solveSources(factor: Factor, conductance: Float64Array, emf: Float64Array, without: number): Float64Array {
    const { network } = this
    const x = new Float64Array(network.size)
    const loops: number[] = []
    let any = false
    for (let i = 0; i < emf.length; i++) {
      if (emf[i] === 0 || i === without) continue
      const amps = emf[i]! * conductance[i]!
      const { a, b } = network.branches[i]!
      if (a >= 0 && b >= 0 && Math.abs(amps) > loopFromAmps) {
        loops.push(i)
        continue
      }
      any = true
      if (a >= 0) x[a]! += amps
      if (b >= 0) x[b]! -= amps
    }
    if (any) solveInPlace(factor, x)
    for (const i of loops) {
      const { a, b } = network.branches[i]!
      const others = conductance.slice()
      if (without >= 0) others[without] = 0
      const z = new Float64Array(network.size)
      z[a] = 1
      z[b] = -1
      solveInPlace(this.factorWithout(others, i), z)
      const amps = emf[i]! / (1 / conductance[i]! + Math.max(0, z[a]! - z[b]!))
      for (let k = 0; k < x.length; k++) x[k]! += amps * z[k]!
    }
    return x
  }

  base(states: States, forced: Forced): Base {
    const key = stateKey(states) + forced.key
    let found = this.bases.get(key)
    if (!found) this.bases.set(key, (found = this.factor(states, forced)))
    return found
  }

  private factor(states: States, forced: Forced): Base {
    const { network } = this
    const setting: Setting = {
      positions: this.positions,
      unplugged: this.unplugged,
      battery: this.condition.battery,
      ...states,
      relays: states.relays.map((pulledIn, i) => forced.stuckRelays.get(network.relays[i]!.node) ?? pulledIn),
      forced,
    }
    const count = network.branches.length
    const conductance = new Float64Array(count)
    const emfBattery = new Float64Array(count)
    const emfFixed = new Float64Array(count)
    for (let i = 0; i < count; i++) {
      const branch = network.branches[i]!
      if (!branch.conducts(setting)) continue
      conductance[i] = 1 / branch.ohms(setting)
      if (branch.supply === 'battery') emfBattery[i] = branch.emf(setting)
      else emfFixed[i] = branch.emf(setting)
    }
    // Much of what a fault forces changes nothing in this condition: share the factorisation.
    const same = this.different.find(
      (base) =>
        sameFigures(base.conductance, conductance) &&
        sameFigures(base.emfBattery, emfBattery) &&
        sameFigures(base.emfFixed, emfFixed),
    )
    if (same) return same
    const factor = this.factorWithout(conductance, -1)
    const base: Base = {
      conductance,
      emfBattery,
      emfFixed,
      factor,
      voltsBattery: this.solveSources(factor, conductance, emfBattery, -1),
      voltsFixed: this.solveSources(factor, conductance, emfFixed, -1),
    }
    this.different.push(base)
    return base
  }
}

function sameFigures(a: Float64Array, b: Float64Array): boolean {
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false
  return true
}

export function stateKey(states: States): string {
  let key = ''
  for (const list of [states.relays, states.modules, states.diodes]) {
    for (const on of list) key += on ? '1' : '0'
    key += '/'
  }
  return key
}

/** Factors the conductance matrix, leaving branch `without` out (−1: none). */
function factorNetwork(network: Network, conductance: Float64Array, without: number, leak: number): Factor {
  const edge = new Float64Array(network.order.neighbour.length)
  const toChassis = new Float64Array(network.size).fill(leak, 0, network.leaking)
  const { places } = network
  for (let i = 0; i < places.length; i++) {
    const place = places[i]!
    if (i === without || place === nowhere) continue
    if (place >= 0) edge[place]! += conductance[i]!
    else toChassis[-1 - place]! += conductance[i]!
  }
  return factorise(network.order, edge, toChassis)
}
