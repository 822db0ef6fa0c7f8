import { conditionKey } from '../document/condition'
import type { Condition } from '../document/condition-schema'
import type { Probe, Reading } from '../document/reading-schema'
import { FaultModel, probeKey } from '../faults/fault-model'
import { buildNetwork } from '../solver/build-network'
import type { CandidateSet } from './candidates'
import { workplaceAfter, type Workplace } from './cost'
import { effortOf, minutesOf, standingIn, type Standing } from './effort'
import { forecast } from './forecast'
import { leadsAreSafe } from './safe-leads'
import { binsOf, bitsOf, type Bin } from './split'
import type { Particle } from './particles'

/** A reading worth taking, before it is put into words. */
export interface PlannedReading {
  probe: Probe
  bits: number
  minutes: number
  bins: Bin[]
  /** What each particle foretells. */
  row: Float64Array
}

export interface WeighedReading extends PlannedReading {
  /** Bits per minute. */
  rate: number
}

/**
 * What a reading costs beside its minutes, in minutes: few readings are wanted, not quick ones that tell little.
 * By trial on the sample circuits 3 needed fewer readings and fewer minutes to the end than 0.
 */
export const readingPrice = 3

/** Bits for all that a reading costs. */
export function worthOf({ bits, minutes }: PlannedReading): number {
  return bits / (minutes + readingPrice)
}

/** Readings under this are not worth a name. */
const leastBits = 0.01

/** Weighs readings by the drop in entropy over sites that they are expected to bring, and by their minutes. */
export class Scales {
  readonly found: WeighedReading[] = []
  readonly workplace: Workplace
  private readonly taken: ReadonlySet<string>
  private readonly takenIn: ReadonlySet<string>
  private readonly now: Standing
  private readonly unitOf: Int32Array
  private readonly weights: Float64Array
  private readonly units: number

  constructor(
    private readonly model: FaultModel,
    readonly particles: readonly Particle[],
    readings: readonly Reading[],
    /** Sees every reading's outcomes, whether it can be taken again or not. */
    private readonly see: (bins: readonly Bin[]) => void = () => {},
  ) {
    const sites = [...new Set(particles.map((particle) => particle.site))]
    const numbers = new Map(sites.map((site, i) => [site, i]))
    this.units = sites.length
    this.unitOf = Int32Array.from(particles, (particle) => numbers.get(particle.site)!)
    this.weights = Float64Array.from(particles, (particle) => particle.weight)
    this.workplace = workplaceAfter(model.circuit, readings)
    this.taken = new Set(readings.map((reading) => probeKey(model.circuit, reading)))
    this.takenIn = new Set(readings.map((reading) => conditionKey(model.circuit, reading.condition)))
    this.now = standingIn(model.circuit, this.workplace.condition)
  }

  weigh(set: CandidateSet) {
    const { circuit } = this.model
    const model = modelWith(this.model, set.condition.added)
    const rows = forecast(model, set, this.particles)
    // Where the good circuit keeps switching itself nobody can read anything.
    const restless = this.particles[0]?.hypothesis === null && rows.every((row) => Number.isNaN(row[0]))
    if (restless) return
    const split = rows.map((row, i) => binsOf(set.probes[i]!.kind, row))
    if (split.every((bins) => bins.length < 2)) return
    if (set.condition.added.length > 0 && !leadsAreSafe(model, set.condition, this.particles)) return
    const standing = standingIn(circuit, set.condition)
    const mayBeTaken = this.takenIn.has(conditionKey(circuit, set.condition))
    set.probes.forEach((probe, i) => {
      const bins = split[i]!
      if (bins.length < 2) return
      this.see(bins)
      if (mayBeTaken && this.taken.has(probeKey(circuit, probe))) return
      const bits = bitsOf(bins, this.weights, this.unitOf, this.units)
      if (bits < leastBits) return
      const effort = effortOf(circuit, probe, standing)
      const minutes = minutesOf(effort, this.now, this.workplace.reached)
      this.found.push({ probe, bits, minutes, bins, row: rows[i]!, rate: bits / minutes })
    })
  }
}

const withLeads = new WeakMap<FaultModel, Map<string, FaultModel>>()
/** Networks with leads kept for one model. */
const mostKept = 40

/** The same faults in the network with something put in. */
function modelWith(model: FaultModel, added: Condition['added']): FaultModel {
  if (added.length === 0) return model
  let known = withLeads.get(model)
  if (!known) withLeads.set(model, (known = new Map()))
  const key = JSON.stringify(added)
  let found = known.get(key)
  if (!found) {
    if (known.size >= mostKept) known.clear()
    const network = buildNetwork(model.circuit, added)
    known.set(key, (found = new FaultModel(model.circuit, { network, hypotheses: model.hypotheses })))
  }
  return found
}
