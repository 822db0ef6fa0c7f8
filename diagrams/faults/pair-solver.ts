import { conditionKey, controlCombinations } from '../document/condition'
import { restCondition, type Condition } from '../document/condition-schema'
import type { Probe } from '../document/reading-schema'
import { withBlown } from '../solver/alteration'
import { blownFuses, fuseBranch } from '../solver/blown-fuses'
import { buildNetwork } from '../solver/build-network'
import { Case } from '../solver/case'
import { isShort } from '../solver/fault-alteration'
import { besides, faultHolder, type HeldFault } from '../solver/held-fault'
import type { Network } from '../solver/network'
import { stateKey, Study, type States } from '../solver/study'
import { chargingRange, restingRange, weakRange } from './battery-range'
import type { FaultModel } from './fault-model'
import { predict, type Prediction } from './prediction'
import type { PairMember } from './pair-member'
import { eager, isCertain, reluctant } from './reluctance'

/** Two faults and the fuses they have blown. `held` is written into the network, `swept` is altered in it. */
export interface SolvedPair {
  held: PairMember
  swept: PairMember
  blown: readonly string[]
}

/** A pair at two definite severities in one condition. */
export interface RestingPair {
  given: Case
  severity: number
  /** The state it settles in, as drawn. */
  settled: States
  settledKey: string
  /** Every state its parts may be in, a little eager and a little reluctant, by state. */
  possible: ReadonlyMap<string, States>
}

/** Combinations of controls in which a pair may blow fuses, at most. */
const drivingLimit = 16

/** What settling a pair at two severities and factoring a condition cost, in predictions of one reading, about. */
const settlingPasses = 3
const studyPasses = 8

interface Holder {
  hold: (severity: number) => HeldFault
  bySeverity: Map<number, HeldFault>
}

/** Solves pairs of faults of one circuit; what two pairs share, a held fault in a condition, is solved once. */
export class PairSolver {
  private readonly networks = new Map<string, Network>()
  private readonly holders = new Map<PairMember, Map<Network, Holder>>()
  private readonly studies = new Map<HeldFault, Map<string, Study>>()
  private readonly cases = new Map<SolvedPair, Map<Study, Case>>()
  private readonly conditionKeys = new Map<Condition, string>()
  private readonly driving: Condition[]
  /** Branches gone through so far: what the work done is measured by, the same on every machine. */
  spent = 0

  constructor(readonly model: FaultModel) {
    this.driving = controlCombinations(model.circuit, drivingLimit).map((controls) => ({
      ...restCondition,
      controls,
    }))
  }

  /** Null when the circuit does not come to rest. */
  settle(pair: SolvedPair, heldAt: number, sweptAt: number, probe: Probe): RestingPair | null {
    const given = this.caseOf(pair, heldAt, probe)
    this.spend(settlingPasses)
    const settled = given.settle(sweptAt)
    if (!settled) return null
    const settledKey = stateKey(settled.states)
    const possible = new Map([[settledKey, settled.states]])
    const { relays, modules, diodes } = given.study.network
    const parts = relays.length + modules.length + diodes.length
    if (parts > 0 && !given.passed.every((state) => isCertain(given, state))) {
      const range = given.alteration.weak
        ? weakRange
        : probe.condition.charging
          ? chargingRange
          : restingRange
      for (const [scale, reluctance] of [
        [range.high, eager],
        [range.low, reluctant],
      ] as const) {
        const other = given.settle(sweptAt, scale, reluctance)
        if (!other) return null
        possible.set(stateKey(other.states), other.states)
      }
    }
    return { given, severity: sweptAt, settled: settled.states, settledKey, possible }
  }

  /** Predictions are linear in the battery, so a weak one is predicted for 12.6 V and scaled. */
  predict({ given, severity }: RestingPair, states: States, probe: Probe): Prediction {
    const scale = given.alteration.weak ? 1 : given.scaleFor(severity)
    this.spend(1)
    return predict(given, given.solve(states, severity, scale), probe)
  }

  /** The sets of fuses that two faults blow at their mildest and at their harshest. */
  blownSets(held: PairMember, swept: PairMember): string[][] {
    if (this.model.network.fuses.length === 0 || !(isShort(held.mode) || isShort(swept.mode))) return [[]]
    const sets = new Map<string, string[]>()
    for (const end of ['low', 'high'] as const) {
      const first = this.heldAt(held, held[end], this.model.network)
      const studies = this.driving.map((condition) => this.study(first, condition))
      const alteration = besides(first, swept.alteration)
      this.spend(settlingPasses * studies.length)
      const blown = blownFuses(first.network, studies, alteration, swept[end])
      sets.set(blown.toSorted().join(','), blown)
    }
    return [...sets.values()]
  }

  /** What a pair does in a condition, to be settled at any severity of the swept fault. */
  caseOf(pair: SolvedPair, heldAt: number, probe: { condition: Condition }): Case {
    const held = this.heldAt(pair.held, heldAt, this.networkFor(probe.condition))
    const study = this.study(held, probe.condition)
    return kept(
      kept(this.cases, pair, () => new Map<Study, Case>()),
      study,
      () => {
        const alteration = besides(held, pair.swept.alteration)
        return new Case(study, withBlown(alteration, pair.blown.map(fuseBranch)))
      },
    )
  }

  private networkFor({ added }: Condition): Network {
    const { network, circuit } = this.model
    if (added.length === 0) return network
    return kept(this.networks, JSON.stringify(added), () => buildNetwork(circuit, added))
  }

  heldAt(member: PairMember, severity: number, network: Network): HeldFault {
    const byNetwork = kept(this.holders, member, () => new Map<Network, Holder>())
    const { hold, bySeverity } = kept(byNetwork, network, () => ({
      hold: faultHolder(network, member.alteration),
      bySeverity: new Map<number, HeldFault>(),
    }))
    return kept(bySeverity, severity, () => hold(severity))
  }

  private spend(passes: number) {
    // What a pass costs on even the smallest circuit is that of some fifty branches.
    this.spent += passes * (50 + this.model.network.branches.length)
  }

  conditionName({ condition }: { condition: Condition }): string {
    return kept(this.conditionKeys, condition, () => conditionKey(this.model.circuit, condition))
  }

  private study(held: HeldFault, condition: Condition): Study {
    const key = this.conditionName({ condition })
    const byCondition = kept(this.studies, held, () => new Map<string, Study>())
    return kept(byCondition, key, () => {
      this.spend(studyPasses)
      return new Study(held.network, condition)
    })
  }
}

function kept<K, V>(map: Map<K, V>, key: K, find: () => V): V {
  let found = map.get(key)
  if (found === undefined) map.set(key, (found = find()))
  return found
}
