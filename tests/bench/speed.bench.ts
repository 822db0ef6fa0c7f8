import type { Circuit } from '@/diagrams/document/circuit-schema'
import { noAlteration } from '@/diagrams/solver/alteration'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { voltsAt } from '@/diagrams/solver/case'
import { netlistOf } from '@/diagrams/solver/settled-netlist'
import { harnessOfSize } from '../support/harness-of-size'
import { ngspiceSweepSeconds, solveBySparseLu } from './support/against'
import { argument } from './support/arguments'
import { median, processorMs } from './support/figures'
import { report, type Row } from './support/report'
import { Sweep } from './support/sweep'

/**
 * Speed against general solvers, on harnesses of n unknowns. Against sparse LU: one reading under every
 * fault of every branch at 21 severities, from an unfactored network to the last figure, and the same for
 * ten readings at once. Against ngspice: one resistor swept over 20,000 values on both sides, what comes
 * before the second value (reading the netlist there, locating the fault here) taken off on both. Processor
 * time, five rounds in turn in the same process, medians.
 */
const rounds = argument('rounds', 5)
const spicePoints = 20_000

for (const [unknowns, luGoal, spiceGoal] of [
  [200, 500, 150],
  [500, 1500, 500],
] as const) {
  const circuit = circuitOfUnknowns(unknowns)
  const sweep = new Sweep(circuit)
  const { network, alterations, points, count } = sweep
  const solvedWith = (alteration: (typeof alterations)[number], ohms: number) => {
    const given = sweep.caseOf(alteration)
    const solved = sweep.solve(given, ohms)
    return { solved, netlist: netlistOf(given, solved) }
  }
  const some = alterations.filter((_, i) => i % Math.ceil(alterations.length / 20) === 0)
  agree(some.map((alteration) => solvedWith(alteration, 3)))

  const netlists = some.map((alteration) => solvedWith(alteration, 5).netlist)
  const whole = solvedWith(noAlteration, 0).netlist
  const resistors = whole.elements.filter((e) => e.name.startsWith('wire:') && e.name.endsWith('/from'))
  const kept = points.map((point) => point + 1)
  for (let i = 0; i < 3; i++) {
    sweep.run(points)
    sweep.run(points.slice(0, 1))
    sweep.sweepOne(i, spicePoints, points.slice(0, 1))
    for (const netlist of netlists.slice(0, 3)) solveBySparseLu(netlist)
  }
  const [one, ten, lu, spice, swept]: number[][] = [[], [], [], [], []]
  for (let round = 0; round < rounds; round++) {
    one!.push(usOf(() => sweep.run(points.slice(3, 4))) / count)
    ten!.push(usOf(() => sweep.run(points)) / count)
    lu!.push((1000 * processorMs(() => netlists.forEach(solveBySparseLu))) / netlists.length)
    swept!.push(usOf(() => sweep.sweepOne(round * 37, spicePoints, points.slice(3, 4))) / spicePoints)
    const resistor = resistors[(round * 37) % resistors.length]!.name
    spice!.push((1e6 * ngspiceSweepSeconds(whole, resistor, [0.5, 1e5], spicePoints, kept)) / spicePoints)
  }
  const ratio = (theirs: number[], ours: number[]) => median(theirs.map((us, i) => us / ours[i]!))
  const row = (what: string, figure: number, goal: number, how: string): Row => ({
    what: `faster than ${what}`,
    goal: `≥ ${goal} times`,
    figure: `${figure.toFixed(0)} times`,
    met: figure >= goal,
    how: `n = ${network.size}, median of ${rounds}; ${how}`,
  })
  const us = (list: number[]) => `${median(list).toPrecision(3)} µs`
  report(`Guarded update against general solvers, n = ${unknowns}`, [
    {
      what: 'one fault at one severity, one reading',
      goal: '',
      figure: `${us(one!)} of a whole sweep, ${us(swept!)} of one resistor swept; ${us(lu!)} sparse LU, ${us(spice!)} ngspice`,
      met: null,
      how: `whole sweep: ${count} of them, ${circuit.title}`,
    },
    row(
      'mathjs sparse LU, each fault anew',
      ratio(lu!, one!),
      luGoal,
      `${ratio(lu!, ten!).toFixed(0)} times for ten readings at once`,
    ),
    row(
      'ngspice sweeping a resistor by .dc',
      ratio(spice!, swept!),
      spiceGoal,
      `${ratio(spice!, one!).toFixed(0)} times with the locating of every fault counted here and none of the reading there`,
    ),
  ])

  /** A speed means nothing where the figures differ. */
  function agree(some: ReturnType<typeof solvedWith>[]) {
    let worst = 0
    for (const { solved, netlist } of some) {
      const volts = solveBySparseLu(netlist)
      for (const point of points)
        worst = Math.max(worst, Math.abs(voltsAt(solved, point) - volts[point + 1]!))
    }
    console.log(`sparse LU and the update differ by ${worst.toExponential(1)} V at most`)
    if (worst > 1e-3) throw new Error('the two solvers disagree')
  }
}

/** Microseconds of one call, the mean of several. */
function usOf(work: () => void): number {
  const calls = 5
  const ms = processorMs(() => {
    for (let i = 0; i < calls; i++) work()
  })
  return (1000 * ms) / calls
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
