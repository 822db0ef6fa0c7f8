import { factorise, gatherCurrents, solveInPlace, substituteBack, type Factor } from './factor'
import { unitNear } from './unit-near'
import { nowhere, type Network } from './network'

/** Above this a source between two floating unknowns is solved by its loop, amperes of its Norton current. */
const loopFromAmps = 1

/** Sources of one kind: what they drive into each unknown, and that current gathered up to each pivot. */
export interface SourceFlow {
  /** Branches that are sources, those solved by their loop not among them. */
  branches: number[]
  gathered: Float64Array | null
}

/**
 * A source of a battery's strength between two unknowns. As a current in and out it is hundreds of
 * amperes, whose rounding would put a floating harness off by a millivolt. So it is left out: with z
 * the volts for one ampere from b to a in the network without it, and R = z(a) − z(b), it drives
 * E/(1/g + R) round its loop, and v = z · E/(1/g + R).
 */
export interface SourceLoop {
  branch: number
  battery: boolean
  emf: number
  ownOhms: number
  factor: Factor
  gathered: Float64Array
  z: Float64Array
  /** R, ohm. */
  ohms: number
}

/** How the branches that can be off the drawing take part when one ampere flows between two unknowns. */
export interface Spread {
  /** Those it moves at all. */
  branches: Int32Array
  /** Volts over each branch, a over b; 0 where it moves none. Every branch has its place. */
  moves: Float64Array
}

/** Below this an ampere moves nothing, volts. */
const movesFromVolts = 1e-11

export function spreadOver({ network, conductance }: Base, volts: Float64Array): Spread {
  const moves = new Float64Array(network.branches.length)
  const branches: number[] = []
  for (const k of network.tolerant) {
    if (conductance[k] === 0) continue
    const { a, b } = network.branches[k]!
    const moved = (a < 0 ? 0 : volts[a]!) - (b < 0 ? 0 : volts[b]!)
    if (Math.abs(moved) < movesFromVolts) continue
    moves[k] = moved
    branches.push(k)
  }
  return { branches: Int32Array.from(branches), moves }
}

/** A network in one condition with its parts in one state: factored, and solved for its own sources. */
export class Base {
  readonly factor: Factor
  /** Siemens per branch; 0 where it does not conduct. */
  readonly conductance: Float64Array
  /** Source volts per branch that follow the battery, and those that do not. */
  readonly emfBattery: Float64Array
  readonly emfFixed: Float64Array
  /** Volts per unknown from the battery's sources at their drawn volts, and from fixed sources. */
  readonly voltsBattery: Float64Array
  readonly voltsFixed: Float64Array
  readonly loops: SourceLoop[] = []
  readonly flowBattery: SourceFlow
  readonly flowFixed: SourceFlow
  private readonly units = new Map<number, Float64Array>()
  private readonly spreads = new Map<number, Spread>()
  private flowing: { battery: Float64Array; fixed: Float64Array } | undefined
  private watching: { battery: Float64Array; fixed: Float64Array } | undefined

  constructor(
    readonly network: Network,
    figures: { conductance: Float64Array; emfBattery: Float64Array; emfFixed: Float64Array },
    readonly leak: number,
  ) {
    this.conductance = figures.conductance
    this.emfBattery = figures.emfBattery
    this.emfFixed = figures.emfFixed
    this.factor = this.factorWithout(-1)
    this.flowBattery = this.gather(this.emfBattery, true)
    this.flowFixed = this.gather(this.emfFixed, false)
    this.voltsBattery = this.solve(this.flowBattery, true)
    this.voltsFixed = this.solve(this.flowFixed, false)
  }

  /**
   * Volts per unknown for one ampere from b to a (−1 is chassis): the adjoint of measuring a against
   * b. Kept for readings and parts that many faults ask for. Not to be changed.
   */
  unit(a: number, b: number): Float64Array {
    const key = a * (this.network.size + 1) + b
    let found = this.units.get(key)
    if (!found) this.units.set(key, (found = this.unitOnce(a, b)))
    return found
  }

  /** What that ampere moves; kept likewise. */
  spreadOf(a: number, b: number): Spread {
    const key = a * (this.network.size + 1) + b
    let found = this.spreads.get(key)
    if (!found) this.spreads.set(key, (found = spreadOver(this, this.unit(a, b))))
    return found
  }

  /** Amperes of every branch, from the battery's sources and from fixed ones. */
  currents(): { battery: Float64Array; fixed: Float64Array } {
    const of = (volts: Float64Array, emf: Float64Array) =>
      Float64Array.from(this.network.branches, ({ a, b }, k) => {
        const over = (a < 0 ? 0 : volts[a]!) - (b < 0 ? 0 : volts[b]!)
        return this.conductance[k]! * (over - emf[k]!)
      })
    return (this.flowing ??= {
      battery: of(this.voltsBattery, this.emfBattery),
      fixed: of(this.voltsFixed, this.emfFixed),
    })
  }

  /** Volts of every watched pair. */
  watched(): { battery: Float64Array; fixed: Float64Array } {
    return (this.watching ??= {
      battery: overPairs(this.network, this.voltsBattery),
      fixed: overPairs(this.network, this.voltsFixed),
    })
  }

  /** Volts of such an ampere over its own ends and over the watched pairs alone, without going through the rest. */
  unitAt(a: number, b: number): { atA: number; atB: number; watched: Float64Array } {
    const { network, factor } = this
    const volts = unitNear(factor, a, b, network.watchedPivots)
    return {
      atA: a === b || a < 0 ? 0 : volts[a]!,
      atB: a === b || b < 0 ? 0 : volts[b]!,
      watched: a === b ? new Float64Array(network.watched.length) : overPairs(network, volts),
    }
  }

  /** The same, not kept. */
  unitOnce(a: number, b: number): Float64Array {
    return unitCurrent(this.factor, a, b)
  }

  private factorWithout(without: number): Factor {
    const { network, conductance } = this
    const edge = new Float64Array(network.order.neighbour.length)
    const toChassis = new Float64Array(network.size).fill(this.leak, 0, network.leaking)
    const { places } = network
    for (let i = 0; i < places.length; i++) {
      const place = places[i]!
      if (i === without || place === nowhere) continue
      if (place >= 0) edge[place]! += conductance[i]!
      else toChassis[-1 - place]! += conductance[i]!
    }
    return factorise(network.order, edge, toChassis)
  }

  private gather(emf: Float64Array, battery: boolean): SourceFlow {
    const x = new Float64Array(this.network.size)
    const branches: number[] = []
    for (let i = 0; i < emf.length; i++) {
      if (emf[i] === 0) continue
      const amps = emf[i]! * this.conductance[i]!
      const { a, b } = this.network.branches[i]!
      if (a >= 0 && b >= 0 && Math.abs(amps) > loopFromAmps) {
        this.loops.push(this.loopOf(i, emf[i]!, battery))
        continue
      }
      branches.push(i)
      if (a >= 0) x[a]! += amps
      if (b >= 0) x[b]! -= amps
    }
    return { branches, gathered: branches.length > 0 ? gatherCurrents(this.factor, x) : null }
  }

  private loopOf(branch: number, emf: number, battery: boolean): SourceLoop {
    const { a, b } = this.network.branches[branch]!
    const factor = this.factorWithout(branch)
    const x = new Float64Array(this.network.size)
    x[a] = 1
    x[b] = -1
    const gathered = gatherCurrents(factor, x)
    const z = substituteBack(factor, gathered.slice())
    return {
      branch,
      battery,
      emf,
      ownOhms: 1 / this.conductance[branch]!,
      factor,
      gathered,
      z,
      ohms: Math.max(0, z[a]! - z[b]!),
    }
  }

  private solve(flow: SourceFlow, battery: boolean): Float64Array {
    const volts = flow.gathered
      ? substituteBack(this.factor, flow.gathered.slice())
      : new Float64Array(this.network.size)
    for (const loop of this.loops) {
      if (loop.battery !== battery) continue
      const amps = loop.emf / (loop.ownOhms + loop.ohms)
      for (let k = 0; k < volts.length; k++) volts[k]! += amps * loop.z[k]!
    }
    return volts
  }
}

/** Volts over every watched pair. */
export function overPairs({ watched }: Network, volts: Float64Array): Float64Array {
  const over = new Float64Array(watched.length)
  for (let i = 0; i < over.length; i++) {
    const [a, b] = watched[i]!
    over[i] = (a < 0 ? 0 : volts[a]!) - (b < 0 ? 0 : volts[b]!)
  }
  return over
}

/** Volts per unknown for one ampere put in at p and taken out at q (−1 is chassis). */
export function unitCurrent(factor: Factor, p: number, q: number): Float64Array {
  const x = new Float64Array(factor.order.size)
  if (p === q) return x
  if (p >= 0) x[p]! += 1
  if (q >= 0) x[q]! -= 1
  return solveInPlace(factor, x)
}
