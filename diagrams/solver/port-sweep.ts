import type { Base } from './base'
import { wayToLast } from './elimination-order'
import { takeOut } from './taken-out'
import { unitNear } from './unit-near'

/** Volts and ohms between two unknowns as one fault grows, one figure per severity. */
export interface Swept {
  voltsBattery: Float64Array
  voltsFixed: Float64Array
  ohms: Float64Array
}

/**
 * Sweeps faults of a settled network as they show at one pair of leads. What is asked of the network per fault is the
 * way from its place and from the leads to the last pivot, nothing else; per severity a few multiplications.
 */
export class PortSweep {
  private readonly pivots: Int32Array
  private readonly ohms: number
  private readonly voltsBattery: number
  private readonly voltsFixed: number

  constructor(
    readonly base: Base,
    private readonly a: number,
    private readonly b: number,
  ) {
    this.pivots = wayToLast(base.network.order, [a, b])
    const y = base.unit(a, b)
    this.ohms = at(y, a) - at(y, b)
    this.voltsBattery = at(base.voltsBattery, a) - at(base.voltsBattery, b)
    this.voltsFixed = at(base.voltsFixed, a) - at(base.voltsFixed, b)
  }

  /** A resistance in series with a branch that conducts, ohm by ohm of `severities`. */
  series(branch: number, severities: Float64Array, into: Swept) {
    const { base } = this
    const open = takeOut(base, branch, this.pivots)
    const moved = at(open.unit, this.a) - at(open.unit, this.b)
    const around = 1 / base.conductance[branch]! + open.ohms
    const battery = (moved * (open.voltsBattery - base.emfBattery[branch]!)) / around
    const fixed = (moved * (open.voltsFixed - base.emfFixed[branch]!)) / around
    const square = (moved * moved) / around
    for (let i = 0; i < severities.length; i++) {
      const part = severities[i]! / (severities[i]! + around)
      into.voltsBattery[i] = this.voltsBattery + part * battery
      into.voltsFixed[i] = this.voltsFixed + part * fixed
      into.ohms[i] = this.ohms + part * square
    }
  }

  /** A resistance between two unknowns (−1 is chassis). */
  across(p: number, q: number, severities: Float64Array, into: Swept) {
    const { base } = this
    const unit = unitNear(base.factor, p, q, this.pivots)
    const moved = at(unit, this.a) - at(unit, this.b)
    const between = Math.max(0, at(unit, p) - at(unit, q))
    const battery = moved * (at(base.voltsBattery, p) - at(base.voltsBattery, q))
    const fixed = moved * (at(base.voltsFixed, p) - at(base.voltsFixed, q))
    for (let i = 0; i < severities.length; i++) {
      const siemens = 1 / (severities[i]! + between)
      into.voltsBattery[i] = this.voltsBattery - siemens * battery
      into.voltsFixed[i] = this.voltsFixed - siemens * fixed
      into.ohms[i] = Math.max(0, this.ohms - siemens * moved * moved)
    }
  }
}

function at(volts: Float64Array, unknown: number): number {
  return unknown < 0 ? 0 : volts[unknown]!
}
