import type { Base, SourceFlow } from './base'
import type { EliminationOrder } from './elimination-order'
import type { Factor } from './factor'
import { nowhere, type Network } from './network'

/** What stands between the ends of a branch, a over b, once it is taken out of its network. */
export interface OpenEnds {
  /** Ohm from end to end without the branch. */
  ohms: number
  /** Volts from the battery's sources and from fixed ones, the branch's own not counted. */
  voltsBattery: number
  voltsFixed: number
  /**
   * Volts per unknown for one ampere put in at the branch's a and taken out at its b; right at those two and at the
   * pivots asked for. Changed at the next call for the same order.
   */
  unit: Float64Array
}

/**
 * Takes a branch out. Only pivots from its ends to the last one change, and those are made anew by
 * the same sums of positive numbers, the others' part in them kept: no subtraction, so also what
 * floats once the branch is gone keeps full accuracy. O(height of the elimination tree) and of `pivots`,
 * which run from the last to the first, none left out on their way.
 */
export function takeOut(base: Base, branch: number, pivots: Int32Array): OpenEnds {
  const { network } = base
  const { a, b } = network.branches[branch]!
  if (network.places[branch] === nowhere)
    return {
      ohms: 0,
      voltsBattery: 0,
      voltsFixed: 0,
      unit: new Float64Array(network.size),
    }
  const path = pathOf(network.order)
  path.remake(base, base.factor, branch)
  const ohms = Math.max(0, path.unit(a, b))
  const unit = path.near(pivots)
  const open: OpenEnds = {
    ohms,
    voltsBattery: path.sources(base, base.flowBattery, base.emfBattery, branch, a, b),
    voltsFixed: path.sources(base, base.flowFixed, base.emfFixed, branch, a, b),
    unit,
  }
  const ownOhms = 1 / base.conductance[branch]!
  for (const loop of base.loops) {
    if (loop.branch === branch) continue
    path.remake(base, loop.factor, branch)
    const { a: from, b: to } = network.branches[loop.branch]!
    const between = path.dipole(loop.gathered, from, to, a, b)
    // What one ampere round the loop put through the branch now takes another way.
    const without = loop.ohms + between ** 2 / (ownOhms + Math.max(0, path.unit(a, b)))
    const volts = (loop.emf / (loop.ownOhms + without)) * between
    if (loop.battery) open.voltsBattery += volts
    else open.voltsFixed += volts
  }
  return open
}

/** Volts per unknown, with the branch taken out, for one ampere put in at its a and taken out at its b. */
export function openUnit(base: Base, branch: number): Float64Array {
  const { network } = base
  const { a, b } = network.branches[branch]!
  if (network.places[branch] === nowhere) return new Float64Array(network.size)
  const path = pathOf(network.order)
  path.remake(base, base.factor, branch)
  path.unit(a, b)
  return path.everywhere()
}

function volt(volts: Float64Array, unknown: number): number {
  return unknown < 0 ? 0 : volts[unknown]!
}

const pathByOrder = new WeakMap<EliminationOrder, RemadePath>()

function pathOf(order: EliminationOrder): RemadePath {
  let found = pathByOrder.get(order)
  if (!found) pathByOrder.set(order, (found = new RemadePath(order)))
  return found
}

/** The pivots from one unknown to the last, made anew with a branch left out. One at a time per order. */
class RemadePath {
  private readonly path: number[] = []
  private readonly onPath: Uint8Array
  private readonly pivot: Float64Array
  private readonly leak: Float64Array
  private readonly share: Float64Array
  private readonly flow: Float64Array
  private readonly volts: Float64Array
  private readonly nearby: Float64Array
  private factor!: Factor

  constructor(private readonly order: EliminationOrder) {
    this.onPath = new Uint8Array(order.size)
    this.pivot = new Float64Array(order.size)
    this.leak = new Float64Array(order.size)
    this.flow = new Float64Array(order.size)
    this.volts = new Float64Array(order.size)
    this.nearby = new Float64Array(order.size)
    this.share = new Float64Array(order.neighbour.length)
  }

  remake(base: Base, factor: Factor, without: number) {
    const { order, path, onPath, pivot, leak, share } = this
    const { first, count, parent, inflows } = order
    const { owner, firstGiven, given, firstJoined, joinedX, joinedY } = inflows
    this.factor = factor
    for (const k of path) onPath[k] = 0
    path.length = 0
    const place = base.network.places[without]!
    const start = place >= 0 ? owner[place]! : -1 - place
    // Of a battery solved by its loop the factor has nothing to begin with.
    const except = factor === base.factor ? -1 : (base.loops.find((l) => l.factor === factor)?.branch ?? -1)
    const others = siemensBesides(base.network, base.conductance, without, except)
    for (let k = start; k >= 0; k = parent[k]!) {
      path.push(k)
      onPath[k] = 1
      let s =
        k === start && place < 0 ? others + (k < base.network.leaking ? base.leak : 0) : factor.toChassis[k]!
      for (let at = firstGiven[k]!; at < firstGiven[k + 1]!; at++) {
        const slot = given[at]!
        const from = owner[slot]!
        s += onPath[from] ? share[slot]! * leak[from]! : factor.share[slot]! * factor.leak[from]!
      }
      leak[k] = s
      let d = s
      const last = first[k]! + count[k]!
      for (let slot = first[k]!; slot < last; slot++) {
        let c = slot === place ? others : factor.edge[slot]!
        for (let at = firstJoined[slot]!; at < firstJoined[slot + 1]!; at++) {
          const x = joinedX[at]!
          const y = joinedY[at]!
          const from = owner[x]!
          c += onPath[from]
            ? share[x]! * share[y]! * pivot[from]!
            : factor.share[x]! * factor.share[y]! * factor.pivot[from]!
        }
        share[slot] = c
        d += c
      }
      pivot[k] = d
      for (let slot = first[k]!; slot < last; slot++) share[slot] = share[slot]! / d
    }
  }

  /** Volts a over b for one ampere from b to a. */
  unit(a: number, b: number): number {
    return this.dipole(null, a, b, a, b)
  }

  /** Volts of the path and of further pivots, after `unit`. */
  near(pivots: Int32Array): Float64Array {
    this.spread(pivots, this.nearby)
    return this.nearby
  }

  /** Volts of every unknown, after `unit`. */
  everywhere(): Float64Array {
    const volts = new Float64Array(this.order.size)
    this.spread(this.order.lastToFirst, volts)
    return volts
  }

  /** From the path to other pivots, where nothing goes in; `pivots` from the last to the first, none left out in between. */
  private spread(pivots: Int32Array, volts: Float64Array) {
    const { onPath, factor } = this
    for (const k of this.path) volts[k] = this.volts[k]!
    const { first, count, neighbour } = this.order
    const { share } = factor
    for (const k of pivots) {
      if (onPath[k]) continue
      let v = 0
      for (let slot = first[k]!, last = slot + count[k]!; slot < last; slot++)
        v += share[slot]! * volts[neighbour[slot]!]!
      volts[k] = v
    }
  }

  /** Volts a over b for one ampere from `to` to `from`, gathered in the whole network. */
  dipole(gathered: Float64Array | null, from: number, to: number, a: number, b: number): number {
    const { flow, path } = this
    for (const k of path) flow[k] = (k === from ? 1 : 0) - (k === to ? 1 : 0)
    return this.between(gathered, a, b)
  }

  /** Volts a over b from all sources of one kind but the branch's own and those solved by their loop. */
  sources(base: Base, source: SourceFlow, emf: Float64Array, without: number, a: number, b: number): number {
    if (!source.gathered) return 0
    const { flow, path, onPath } = this
    for (const k of path) flow[k] = 0
    for (const i of source.branches) {
      if (i === without) continue
      const { a: from, b: to } = base.network.branches[i]!
      const amps = emf[i]! * base.conductance[i]!
      if (from >= 0 && onPath[from]) flow[from]! += amps
      if (to >= 0 && onPath[to]) flow[to]! -= amps
    }
    return this.between(source.gathered, a, b)
  }

  /** `flow` holds what goes in at each pivot itself; `gathered` what pivots off the path have gathered. */
  private between(gathered: Float64Array | null, a: number, b: number): number {
    const { path, volts, flow, pivot, share, onPath, factor } = this
    const { first, count, neighbour, inflows } = this.order
    const { firstGiven, given, owner } = inflows
    for (const k of path)
      for (let at = firstGiven[k]!; at < firstGiven[k + 1]!; at++) {
        const slot = given[at]!
        const from = owner[slot]!
        if (onPath[from]) flow[k]! += share[slot]! * flow[from]!
        else if (gathered) flow[k]! += factor.share[slot]! * gathered[from]!
      }
    for (let at = path.length - 1; at >= 0; at--) {
      const k = path[at]!
      let v = flow[k]! / pivot[k]!
      for (let slot = first[k]!, last = slot + count[k]!; slot < last; slot++)
        v += share[slot]! * volts[neighbour[slot]!]!
      volts[k] = v
    }
    return volt(volts, a) - volt(volts, b)
  }
}

/** Siemens of the branches that lie in the same place. */
function siemensBesides(network: Network, conductance: Float64Array, branch: number, except: number): number {
  let sum = 0
  for (const other of network.besides[branch]!) if (other !== except) sum += conductance[other]!
  return sum
}
