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
 * Speed against general solvers, on harnesses of n unknowns: one reading under every fault of every branch
 * at 21 severities, and the same for ten readings at once. Here a sweep goes from an unfactored network to
 * the last figure; the others' time to read a netlist is not counted. Processor time, five rounds in turn
 * in the same process, medians.
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
  const swept = whole.elements.filter((e) => e.name.startsWith('wire:') && e.name.endsWith('/from'))
  const kept = points.map((point) => point + 1)
  for (let i = 0; i < 3; i++) {
    sweep.run(points)
    sweep.run(points.slice(0, 1))
    for (const netlist of netlists.slice(0, 3)) solveBySparseLu(netlist)
  }
  const [one, ten, lu, spice]: number[][] = [[], [], [], []]
  for (let round = 0; round < rounds; round++) {
    one!.push(usOf(() => sweep.run(points.slice(3, 4))) / count)
    ten!.push(usOf(() => sweep.run(points)) / count)
    lu!.push((1000 * processorMs(() => netlists.forEach(solveBySparseLu))) / netlists.length)
    const resistor = swept[(round * 37) % swept.length]!.name
    spice!.push((1e6 * ngspiceSweepSeconds(whole, resistor, [0.5, 1e5], spicePoints, kept)) / spicePoints)
  }
  const ratio = (theirs: number[], ours: number[]) => median(theirs.map((us, i) => us / ours[i]!))
  const row = (what: string, theirs: number[], goal: number): Row => ({
    what: `faster than ${what}`,
    goal: `≥ ${goal} times`,
    figure: `${ratio(theirs, one!).toFixed(0)} times`,
    met: ratio(theirs, one!) >= goal,
    how: `n = ${network.size}, median of ${rounds}; ${ratio(theirs, ten!).toFixed(0)} times for ten readings at once`,
  })
  const us = (list: number[]) => `${median(list).toPrecision(3)} µs`
  report(`Guarded update against general solvers, n = ${unknowns}`, [
    {
      what: 'one fault at one severity',
      goal: '',
      figure: `${us(one!)} here, ${us(ten!)} for ten readings; ${us(lu!)} sparse LU, ${us(spice!)} ngspice`,
      met: null,
      how: `${count} of them, ${circuit.title}`,
    },
    row('mathjs sparse LU, each fault anew', lu!, luGoal),
    row('ngspice sweeping a resistor by .dc', spice!, spiceGoal),
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
