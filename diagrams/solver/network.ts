import type { Circuit, ControlsSetting } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { orderElimination, wayToLast, type EliminationOrder } from './elimination-order'

/** What decides whether a branch conducts: the condition, the states of the parts and what a fault forces. */
export interface Setting {
  positions: ControlsSetting
  unplugged: ReadonlySet<string>
  battery: boolean
  /** Contact position per relay: pulled in. */
  relays: readonly boolean[]
  /** Awake per module. */
  modules: readonly boolean[]
  /** Conducting per diode. */
  diodes: readonly boolean[]
  forced: Forced
}

/** What a fault forces on parts without changing a resistance. Branch names, node ids. */
export interface Forced {
  /** Same key, same forcing; empty when nothing is forced. */
  key: string
  /** Branches that never conduct: blown fuses, dead pins, stuck-open contacts. */
  off: ReadonlySet<string>
  /** Branches that always conduct: stuck-closed contacts, stuck-on pins. */
  on: ReadonlySet<string>
  deadModules: ReadonlySet<string>
  /** Relay contacts that stay put, whatever the coil does. */
  stuckRelays: ReadonlyMap<string, boolean>
  /** Coils that never pull in and loads that never work: their own element is open or shorted. */
  idle: ReadonlySet<string>
}

export const nothingForced: Forced = {
  key: '',
  off: new Set(),
  on: new Set(),
  deadModules: new Set(),
  stuckRelays: new Map(),
  idle: new Set(),
}

/** A two-terminal element: a resistance, with a source in series where `emf` is not 0. */
export interface Branch {
  name: string
  /** Unknowns of its ends; −1 is chassis. Current counts positive from a to b inside the branch. */
  a: number
  b: number
  /** Contacts and inner joints are exact; every other resistance may differ by 5 %. */
  exact: boolean
  /** Whose volts its source follows: the battery's state, or its own fixed figure. */
  supply: 'battery' | 'fixed'
  /** True when the states of parts or what a fault forces decide whether it conducts or what it drives. */
  varies: boolean
  ohms(setting: Setting): number
  conducts(setting: Setting): boolean
  /** Volts that a stands over b at zero current. */
  emf(setting: Setting): number
}

export interface RelayState {
  node: string
  coil: number
  pullIn: number
}
export interface ModuleState {
  node: string
  /** Unknowns behind each supply pin. */
  supplies: number[]
  innerGround: number
  runsFrom: number
}
export interface DiodeState {
  branch: number
  volts: number
}
export interface FuseState {
  node: string
  branch: number
  amps: number
}
export interface LoadState {
  node: string
  branch: number
  worksFromVolts: number
}
export interface InputState {
  /** `module.pin` */
  point: string
  inner: number
  innerGround: number
  threshold: number
  module: number
}

/** The circuit as unknown voltages and branches, whatever the condition. */
export interface Network {
  circuit: Circuit
  added: Condition['added']
  size: number
  /** Unknowns below this number leak to chassis; those of a held fault, inside a part, do not. */
  leaking: number
  order: EliminationOrder
  branches: Branch[]
  branchIndex: ReadonlyMap<string, number>
  /** Unknown of every point; −1 for chassis. */
  unknownOf: ReadonlyMap<string, number>
  /** Unknown in the middle of each wire. */
  middleOf: ReadonlyMap<string, number>
  /** Where each branch's conductance is added: slot ≥ 0, or −1 − unknown when it goes to chassis, or null. */
  places: Int32Array
  /** Branches that may be off the drawing. */
  tolerant: Int32Array
  /** The other branches that are added in the same place as each. */
  besides: readonly (readonly number[])[]
  /** Pairs whose volts decide the states: every coil, diode, supply of every module; then every fuse. */
  watched: readonly (readonly [number, number])[]
  firstWatchedFuse: number
  /** Their unknowns and all those on the way to the last pivot, from the last to the first. */
  watchedPivots: Int32Array
  relays: RelayState[]
  modules: ModuleState[]
  diodes: DiodeState[]
  fuses: FuseState[]
  loads: LoadState[]
  inputs: InputState[]
}

/** Slot numbers for `places`; a branch with both ends on the same unknown goes nowhere. */
export const nowhere = -0x40000000

/** A network before what follows from its branches has been worked out. */
export type NetworkParts = Omit<
  Network,
  | 'order'
  | 'places'
  | 'tolerant'
  | 'besides'
  | 'watched'
  | 'firstWatchedFuse'
  | 'watchedPivots'
  | 'branchIndex'
  | 'leaking'
>

export function finishNetwork(parts: NetworkParts & { leaking?: number }): Network {
  const inside = parts.branches.filter((x) => x.a >= 0 && x.b >= 0 && x.a !== x.b)
  const order = orderElimination(
    parts.size,
    inside.map((x) => [x.a, x.b]),
  )
  const places = Int32Array.from(parts.branches, (x) =>
    x.a === x.b ? nowhere : x.a < 0 ? -1 - x.b : x.b < 0 ? -1 - x.a : order.slotOf(x.a, x.b),
  )
  const watched = watchedPairs(parts)
  return {
    leaking: parts.size,
    ...parts,
    order,
    places,
    tolerant: Int32Array.from(parts.branches.flatMap((x, i) => (x.exact ? [] : [i]))),
    besides: othersInPlace(places),
    watched,
    firstWatchedFuse: watched.length - parts.fuses.length,
    watchedPivots: wayToLast(order, watched.flat()),
    branchIndex: new Map(parts.branches.map((x, i) => [x.name, i])),
  }
}

function watchedPairs({
  branches,
  relays,
  diodes,
  modules,
  fuses,
}: Pick<Network, 'branches' | 'relays' | 'diodes' | 'modules' | 'fuses'>): [number, number][] {
  const ends = (branch: number): [number, number] => [branches[branch]!.a, branches[branch]!.b]
  return [
    ...relays.map((relay) => ends(relay.coil)),
    ...diodes.map((diode) => ends(diode.branch)),
    ...modules.flatMap(({ supplies, innerGround }) =>
      supplies.map((pin): [number, number] => [pin, innerGround]),
    ),
    ...fuses.map((fuse) => ends(fuse.branch)),
  ]
}

function othersInPlace(places: Int32Array): readonly (readonly number[])[] {
  const inPlace = new Map<number, number[]>()
  places.forEach((place, i) => {
    const list = inPlace.get(place)
    if (list) list.push(i)
    else inPlace.set(place, [i])
  })
  return Array.from(places, (place, i) =>
    place === nowhere ? [] : inPlace.get(place)!.filter((other) => other !== i),
  )
}
