import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import { noAlteration, type Alteration } from '@/diagrams/solver/alteration'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { Case, voltsAt } from '@/diagrams/solver/case'
import type { Network } from '@/diagrams/solver/network'
import { Study } from '@/diagrams/solver/study'

export const severities = Array.from({ length: 21 }, (_, i) => 0.5 * (1e5 / 0.5) ** (i / 20))

/** Every fault of every branch of a circuit, at every severity, in one condition with its parts at rest in one state. */
export class Sweep {
  readonly network: Network
  readonly alterations: Alteration[]
  readonly points: number[]
  private readonly condition = { ...restCondition, controls: { sel0: 'on', sel1: 'on' } }
  private readonly states

  constructor(circuit: Circuit) {
    this.network = buildNetwork(circuit)
    this.alterations = everyAlteration(this.network)
    const all = [...this.network.unknownOf.values()].filter((unknown) => unknown >= 0)
    this.points = Array.from({ length: 10 }, (_, i) => all[Math.floor((i * all.length) / 10)]!)
    const settled = this.caseOf(noAlteration).settle(0)
    if (!settled) throw new Error(`${circuit.title} does not come to rest`)
    this.states = settled.states
  }

  get count(): number {
    return this.alterations.length * severities.length
  }

  caseOf(alteration: Alteration): Case {
    return new Case(new Study(this.network, this.condition), alteration)
  }

  solve(given: Case, ohms: number) {
    return given.solve(this.states, ohms, 1)
  }

  /** From an unfactored network to the last figure: volts at so many points under every fault at every severity. */
  run(points: readonly number[]): number {
    let sum = 0
    const study = new Study(this.network, this.condition)
    for (const alteration of this.alterations) {
      const given = new Case(study, alteration)
      for (const ohms of severities) {
        const solved = given.solve(this.states, ohms, 1)
        for (const point of points) sum += voltsAt(solved, point)
      }
    }
    return sum
  }

  /** One branch's resistance swept over so many values: volts at the points. */
  sweepOne(branch: number, values: number, points: readonly number[]): number {
    let sum = 0
    const given = this.caseOf(this.alterations[branch % this.network.branches.length]!)
    for (let i = 0; i < values; i++) {
      const solved = given.solve(this.states, 0.5 + (i * 1e5) / values, 1)
      for (const point of points) sum += voltsAt(solved, point)
    }
    return sum
  }
}

/** Every branch with a resistance in series, every wire's middle shorted to chassis. */
function everyAlteration(network: Network): Alteration[] {
  const { forced } = noAlteration
  return [
    ...network.branches.map((_, i) => ({ series: [i], shunt: null, weak: false, forced })),
    ...[...network.middleOf.values()].map((middle) => ({
      series: [],
      shunt: [middle, -1] as const,
      weak: false,
      forced,
    })),
  ]
}
