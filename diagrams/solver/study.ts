import { positionsIn } from '../document/condition'
import type { Condition } from '../document/condition-schema'
import { Base } from './base'
import { leakSiemens, nominalBatteryVolts, nominalChargingVolts } from './constants'
import { nothingForced, type Forced, type Network, type Setting } from './network'

/** Which relays have pulled in, which modules are awake, which diodes conduct. */
export interface States {
  relays: boolean[]
  modules: boolean[]
  diodes: boolean[]
}

/** One circuit in one condition; factorisations are made once per state and kept. */
export class Study {
  private readonly bases = new Map<string, Base>()
  private readonly byStates = new WeakMap<States, Map<string, Base>>()
  private readonly different = new Map<string, Base>()
  private readonly known = new Map<string, States>()
  private readonly rest: States
  private readonly positions
  private readonly unplugged
  private readonly varying: number[]
  private readonly plain: { conductance: Float64Array; emfBattery: Float64Array; emfFixed: Float64Array }
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
    const { relays, modules, diodes, branches } = network
    this.rest = this.same({
      relays: relays.map(() => false),
      modules: modules.map(() => false),
      diodes: diodes.map(() => false),
    })
    this.varying = branches.flatMap((branch, i) => (branch.varies ? [i] : []))
    this.plain = this.figures(this.rest, nothingForced)
  }

  /** Everything asleep and released. */
  atRest(): States {
    return this.rest
  }

  /** The one object that stands for equal states. Not to be changed. */
  same(states: States): States {
    const key = stateKey(states)
    let found = this.known.get(key)
    if (!found) this.known.set(key, (found = states))
    return found
  }

  base(states: States, forced: Forced): Base {
    let byForced = this.byStates.get(states)
    if (!byForced) this.byStates.set(states, (byForced = new Map()))
    let found = byForced.get(forced.key)
    if (found) return found
    const key = stateKey(states) + forced.key
    found = this.bases.get(key) ?? this.factor(states, forced)
    this.bases.set(key, found)
    byForced.set(forced.key, found)
    return found
  }

  private settingOf(states: States, forced: Forced): Setting {
    return {
      positions: this.positions,
      unplugged: this.unplugged,
      battery: this.condition.battery,
      ...states,
      relays: states.relays.map(
        (pulledIn, i) => forced.stuckRelays.get(this.network.relays[i]!.node) ?? pulledIn,
      ),
      forced,
    }
  }

  /** Conductance and source volts of every branch. */
  private figures(states: States, forced: Forced) {
    const count = this.network.branches.length
    const figures = {
      conductance: new Float64Array(count),
      emfBattery: new Float64Array(count),
      emfFixed: new Float64Array(count),
    }
    const setting = this.settingOf(states, forced)
    for (let i = 0; i < count; i++) this.setBranch(figures, i, setting)
    return figures
  }

  /** Sets one branch's figures; says in a letter what it does, for a key. */
  private setBranch(figures: Study['plain'], i: number, setting: Setting): string {
    const branch = this.network.branches[i]!
    figures.conductance[i] = 0
    figures.emfBattery[i] = 0
    figures.emfFixed[i] = 0
    if (!branch.conducts(setting)) return '-'
    figures.conductance[i] = 1 / branch.ohms(setting)
    const emf = branch.emf(setting)
    if (branch.supply === 'battery') figures.emfBattery[i] = emf
    else figures.emfFixed[i] = emf
    return emf === 0 ? 'o' : 'e'
  }

  private factor(states: States, forced: Forced): Base {
    const figures = {
      conductance: this.plain.conductance.slice(),
      emfBattery: this.plain.emfBattery.slice(),
      emfFixed: this.plain.emfFixed.slice(),
    }
    const setting = this.settingOf(states, forced)
    let key = ''
    for (const i of this.varying) key += this.setBranch(figures, i, setting)
    // Much of what a fault forces changes nothing in this condition: share the factorisation.
    let found = this.different.get(key)
    if (!found) this.different.set(key, (found = new Base(this.network, figures, this.leak)))
    return found
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
