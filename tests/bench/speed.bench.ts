import { restCondition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { noAlteration, type Alteration } from '@/diagrams/solver/alteration'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { Case, voltsAt } from '@/diagrams/solver/case'
import type { Network } from '@/diagrams/solver/network'
import { netlistOf } from '@/diagrams/solver/settled-netlist'
import { Study } from '@/diagrams/solver/study'
import { harnessOfSize } from '../support/harness-of-size'
import { ngspiceSweepSeconds, solveBySparseLu } from './support/against'
import { argument } from './support/arguments'
import { median, processorMs } from './support/figures'
import { report, type Row } from './support/report'

/**
 * Speed against general solvers, on harnesses of n unknowns: one reading under every fault of every branch
 * at 21 severities, and the same for ten readings at once. Here a sweep goes from an unfactored network to
 * the last figure; the others' time to read a netlist is not counted. Processor time, five rounds in turn
 * in the same process, medians.
 */
const rounds = argument('rounds', 5)
const severities = Array.from({ length: 21 }, (_, i) => 0.5 * (1e5 / 0.5) ** (i / 20))
const nothing = noAlteration.forced

for (const [unknowns, luGoal, spiceGoal] of [
  [200, 500, 150],
  [500, 1500, 500],
] as const) {
  const circuit = circuitOfUnknowns(unknowns)
  const network = buildNetwork(circuit)
  const condition = { ...restCondition, controls: { sel0: 'on', sel1: 'on' } }
  const points = tenPoints(network)
  const alterations = everyAlteration(network)
  const study = () => new Study(network, condition)
  const states = settledStates(network, condition)

  const sweep = (faults: readonly Alteration[], points: readonly number[]) => {
    let sum = 0
    const fresh = study()
    for (const fault of faults) {
      const given = new Case(fresh, fault)
      for (const ohms of severities) {
        const solved = given.solve(states, ohms, 1)
        for (const point of points) sum += voltsAt(solved, point)
      }
    }
    return sum
  }
  const netlists = alterations
    .filter((_, i) => i % Math.ceil(alterations.length / 20) === 0)
    .map((fault) => netlistOf(new Case(study(), fault), new Case(study(), fault).solve(states, 5, 1)))
  const whole = netlistOf(
    new Case(study(), noAlteration),
    new Case(study(), noAlteration).solve(states, 0, 1),
  )
  const swept = whole.elements.filter((e) => e.name.startsWith('wire:') && e.name.endsWith('/from'))
  const spicePoints = 20_000

  agree(study(), alterations, states, points)
  for (let i = 0; i < 3; i++) {
    sweep(alterations, points)
    sweep(alterations, points.slice(0, 1))
    for (const netlist of netlists.slice(0, 3)) solveBySparseLu(netlist)
  }
  const one: number[] = []
  const ten: number[] = []
  const lu: number[] = []
  const spice: number[] = []
  for (let round = 0; round < rounds; round++) {
    one.push(usOf(() => sweep(alterations, points.slice(3, 4))) / (alterations.length * severities.length))
    ten.push(usOf(() => sweep(alterations, points)) / (alterations.length * severities.length))
    lu.push((1000 * processorMs(() => netlists.forEach(solveBySparseLu))) / netlists.length)
    const resistor = swept[(round * 37) % swept.length]!
    const seconds = ngspiceSweepSeconds(
      whole,
      resistor.name,
      [0.5, 1e5],
      spicePoints,
      points.map((p) => p + 1),
    )
    spice.push((1e6 * seconds) / spicePoints)
  }
  const ratio = (list: number[], ours: number[]) => median(list.map((us, i) => us / ours[i]!))
  const rows: Row[] = [
    {
      what: 'one fault at one severity',
      goal: '',
      figure: `${median(one).toFixed(2)} µs here for one reading, ${median(ten).toFixed(2)} for ten; ${median(lu).toFixed(0)} sparse LU, ${median(spice).toFixed(0)} ngspice`,
      met: null,
      how: `${alterations.length} faults at ${severities.length} severities, ${circuit.title}`,
    },
    times('mathjs sparse LU, each fault anew', ratio(lu, one), ratio(lu, ten), luGoal, network.size),
    times(
      'ngspice sweeping a resistor by .dc',
      ratio(spice, one),
      ratio(spice, ten),
      spiceGoal,
      network.size,
    ),
  ]
  report(`Guarded update against general solvers, n = ${unknowns}`, rows)
}

/** Microseconds of one call, the mean of several. */
function usOf(work: () => void): number {
  const calls = 5
  const ms = processorMs(() => {
    for (let i = 0; i < calls; i++) work()
  })
  return (1000 * ms) / calls
}

function times(what: string, figure: number, forTen: number, goal: number, size: number): Row {
  return {
    what: `faster than ${what}`,
    goal: `≥ ${goal} times`,
    figure: `${figure.toFixed(0)} times`,
    met: figure >= goal,
    how: `n = ${size}, median of ${rounds}; ${forTen.toFixed(0)} times for ten readings at once`,
  }
}

/** The harness whose equations come nearest to so many unknowns. */
function circuitOfUnknowns(unknowns: number): Circuit {
  let best: { circuit: Circuit; off: number } | undefined
  for (let nodes = Math.round(unknowns / 6); nodes < unknowns / 2; nodes += 4) {
    const circuit = harnessOfSize(11, nodes)
    const off = Math.abs(buildNetwork(circuit).size - unknowns)
    if (!best || off < best.off) best = { circuit, off }
  }
  return best!.circuit
}

function tenPoints(network: Network): number[] {
  const all = [...network.unknownOf.values()].filter((unknown) => unknown >= 0)
  return Array.from({ length: 10 }, (_, i) => all[Math.floor((i * all.length) / 10)]!)
}

/** Every branch with a resistance in series, every wire's middle shorted to chassis. */
function everyAlteration(network: Network): Alteration[] {
  return [
    ...network.branches.map((_, i) => ({ series: [i], shunt: null, weak: false, forced: nothing })),
    ...[...network.middleOf.values()].map((middle) => ({
      series: [],
      shunt: [middle, -1] as const,
      weak: false,
      forced: nothing,
    })),
  ]
}

function settledStates(network: Network, condition: typeof restCondition) {
  const settled = new Case(new Study(network, condition), noAlteration).settle(0)
  if (!settled) throw new Error('the harness does not come to rest')
  return settled.states
}

/** A speed means nothing where the figures differ. */
function agree(
  study: Study,
  alterations: readonly Alteration[],
  states: ReturnType<typeof settledStates>,
  points: readonly number[],
) {
  let worst = 0
  for (let i = 0; i < alterations.length; i += 17) {
    const given = new Case(study, alterations[i]!)
    const solved = given.solve(states, 3, 1)
    const volts = solveBySparseLu(netlistOf(given, solved))
    for (const point of points) worst = Math.max(worst, Math.abs(voltsAt(solved, point) - volts[point + 1]!))
  }
  console.log(`sparse LU and the update differ by ${worst.toExponential(1)} V at most`)
  if (worst > 1e-3) throw new Error('the two solvers disagree')
}
