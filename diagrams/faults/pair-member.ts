import { sitesOf, type Mode } from '../document/sites'
import { alterationKey, type Alteration } from '../solver/alteration'
import { drivingStudies } from '../solver/blown-fuses'
import { Case } from '../solver/case'
import { alterationOf, type FaultKind } from '../solver/fault-alteration'
import { besides, faultHolder } from '../solver/held-fault'
import { Study } from '../solver/study'
import type { FaultModel } from './fault-model'
import type { Hypothesis } from './hypothesis'
import { severityGrid } from './severity-grid'
import { goodShow, showsBy } from './shows'

/** One of the two faults of a pair, without its fuses: those are blown by both together. */
export interface PairMember extends FaultKind {
  /** Severities at which it shows. */
  low: number
  high: number
  /** Its odds among single faults. */
  share: number
  alteration: Alteration
  /** Places of its hypotheses in the model; empty for one that shows only where something else is open, too. */
  hypotheses: number[]
}

/** Relative odds of one mode of one site, as for single faults. */
export type WeightOf = (site: string, mode: Mode) => number

/** Every fault that shows by itself, at all its severities together. */
export function showingMembers(model: FaultModel, weightOf: WeightOf): PairMember[] {
  const found = new Map<string, PairMember>()
  model.hypotheses.forEach((hypothesis, h) => {
    const cells = hypothesis.cells.filter((cell) => cell.share > 0)
    if (cells.length === 0) return
    const low = Math.min(...cells.map((cell) => cell.low))
    const high = Math.max(...cells.map((cell) => cell.high))
    const { site, mode, part } = hypothesis
    const key = kindKey(hypothesis)
    const known = found.get(key)
    if (known) {
      known.low = Math.min(known.low, low)
      known.high = Math.max(known.high, high)
      known.hypotheses.push(h)
    } else {
      const member = memberOf(model, kindOf(hypothesis), low, high)
      found.set(key, {
        ...member,
        share: weightOf(site, mode) * part,
        hypotheses: [h],
      })
    }
  })
  return [...found.values()]
}

function memberOf(model: FaultModel, kind: FaultKind, low: number, high: number): PairMember {
  return { ...kind, low, high, share: 0, alteration: alterationOf(model.network, kind), hypotheses: [] }
}

function kindOf({ site, mode, other, wire }: Hypothesis): FaultKind {
  return { site, mode, other: other ?? undefined, wire: wire ?? undefined }
}

function kindKey({ site, mode, other, wire }: FaultKind | Hypothesis): string {
  return `${site} ${mode} ${other ?? ''} ${wire ?? ''}`
}

/** Opens that nobody notices, because current has another way: beyond this many they are not paired. */
const mostHidden = 30
const showsAtVolts = 0.4

/**
 * Pairs of opens of which neither shows by itself and both together do: two feeds or two grounds side
 * by side. Worked out once a circuit, when two faults are first suspected. `scale` is what makes the weights of
 * those that show sum to 1.
 */
export function hiddenPairs(
  model: FaultModel,
  weightOf: WeightOf,
  scale: number,
): [PairMember, PairMember][] {
  let found = hiddenByModel.get(model)
  if (!found) hiddenByModel.set(model, (found = findHiddenPairs(model)))
  const weighed = (member: PairMember) => ({ ...member, share: scale * weightOf(member.site, member.mode) })
  return found.map(([a, b]) => [weighed(a), weighed(b)])
}

const hiddenByModel = new WeakMap<FaultModel, [PairMember, PairMember][]>()

function findHiddenPairs(model: FaultModel): [PairMember, PairMember][] {
  const { circuit, network } = model
  const shown = new Set(model.hypotheses.map(kindKey))
  const opens: Mode[] = ['open', 'blown', 'stuck-open']
  const hidden = sitesOf(circuit)
    .flatMap((site) =>
      site.modes.filter((mode) => opens.includes(mode)).map((mode) => ({ site: site.id, mode })),
    )
    // A splice fails at one of its wires, which is that wire's own fault.
    .filter((one) => !isSplice(model, one.site) && !shown.has(kindKey(one)))
    .slice(0, mostHidden)
    .map((one) => {
      const grid = severityGrid(one.mode)
      return memberOf(model, one, grid[0]!, grid.at(-1)!)
    })
  const studies = drivingStudies(network)
  const good = goodShow(studies)
  const pairs: [PairMember, PairMember][] = []
  hidden.forEach((a, i) => {
    const held = faultHolder(network, a.alteration)(a.high)
    const driving = studies.map((study) => new Study(held.network, study.condition))
    for (const b of hidden.slice(i + 1)) {
      if (a.site === b.site || alterationKey(a.alteration) === alterationKey(b.alteration)) continue
      const cases = driving.map((study) => new Case(study, besides(held, b.alteration)))
      if (showsBy(cases, good, b.high, showsAtVolts) > showsAtVolts) pairs.push([a, b])
    }
  })
  return pairs
}

function isSplice(model: FaultModel, site: string): boolean {
  return model.circuit.nodes.some((node) => node.kind === 'splice' && site === `part:${node.id}`)
}
