import { positionsIn } from '../document/condition'
import type { Condition } from '../document/condition-schema'
import { leakSiemens, nominalBatteryVolts, nominalChargingVolts } from './constants'
import { factorise, solveInPlace, type Factor } from './factor'
import { nowhere, type Forced, type Network, type Setting } from './network'

/** Which relays have pulled in, which modules are awake, which diodes conduct. */
export interface States {
  relays: boolean[]
  modules: boolean[]
  diodes: boolean[]
}

/** A network in one condition with its parts in one state: factored, and solved for its own sources. */
export interface Base {
  setting: Setting
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
    const factor = this.factorWithout(conductance, -1)
    return {
      setting,
      conductance,
      emfBattery,
      emfFixed,
      factor,
      voltsBattery: solveSources(network, factor, conductance, emfBattery, -1),
      voltsFixed: solveSources(network, factor, conductance, emfFixed, -1),
    }
  }
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
  const toChassis = new Float64Array(network.size).fill(leak)
  const { places } = network
  for (let i = 0; i < places.length; i++) {
    const place = places[i]!
    if (i === without || place === nowhere) continue
    if (place >= 0) edge[place]! += conductance[i]!
    else toChassis[-1 - place]! += conductance[i]!
  }
  return factorise(network.order, edge, toChassis)
}

/** Volts per unknown that the given source volts cause, with branch `without` left out. */
export function solveSources(
  network: Network,
  factor: Factor,
  conductance: Float64Array,
  emf: Float64Array,
  without: number,
): Float64Array {
  const x = new Float64Array(network.size)
  let any = false
  for (let i = 0; i < emf.length; i++) {
    if (emf[i] === 0 || i === without) continue
    any = true
    const amps = emf[i]! * conductance[i]!
    const { a, b } = network.branches[i]!
    if (a >= 0) x[a]! += amps
    if (b >= 0) x[b]! -= amps
  }
  return any ? solveInPlace(factor, x) : x
}
