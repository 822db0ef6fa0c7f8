import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { posteriorOf } from '@/diagrams/faults/posterior'
import { planNext } from '@/diagrams/planner/plan-next'
import { harnessOfSize } from '../support/harness-of-size'
import { argument } from './support/arguments'
import { exponentOf, median, processorMs, quantile } from './support/figures'
import { report } from './support/report'
import { Sweep } from './support/sweep'
import { tenReadings } from './support/ten-readings'

/**
 * How long an answer takes and how it grows with the circuit: ten readings in six conditions of a faulty
 * vehicle, the tenth one new. Warm: the code compiled and the circuit known. Processor time.
 */
const largest = argument('largest', 400)
const sizes = [50, 100, 200, 400].filter((size) => size <= largest)
const harnessesPerSize = argument('harnesses', 4)
const vehiclesPerHarness = argument('vehicles', 5)

const ask = (circuit: Circuit, readings: Reading[]) =>
  evaluate({ circuit, readings, codes: [], priors: 'trade' } as Parameters<typeof evaluate>[0])

interface Times {
  nodes: number
  unknowns: number
  /** A circuit never seen: its hypotheses are made. */
  first: number
  /** The tenth reading is new: all but the plan, and the plan. */
  answer: number[]
  plan: number[]
  /** The same ten readings, one value retyped. */
  again: number[]
  sweep: number
}

function timesOf(circuit: Circuit): Times {
  const sweep = new Sweep(circuit)
  sweep.run(sweep.points)
  const times: Times = {
    nodes: circuit.nodes.length,
    unknowns: sweep.network.size,
    first: processorMs(() => ask(circuit, [])),
    answer: [],
    plan: [],
    again: [],
    sweep: median([0, 0, 0].map(() => processorMs(() => sweep.run(sweep.points)))),
  }
  for (let seed = 1; seed <= vehiclesPerHarness; seed++) {
    const readings = tenReadings(circuit, seed)
    ask(circuit, readings.slice(0, -1))
    const whole = processorMs(() => ask(circuit, readings))
    const model = faultModelOf(circuit)
    const posterior = posteriorOf(model, weighReadings(model, readings), 'trade')
    const plan = processorMs(() => planNext(model, posterior, readings))
    times.plan.push(plan)
    times.answer.push(Math.max(0, whole - plan))
    const last = readings.at(-1)!
    const retyped = [...readings.slice(0, -1), { ...last, id: 'again' }]
    times.again.push(processorMs(() => ask(circuit, retyped)))
  }
  return times
}

// Compiled on another harness, so that the first size is not charged for it.
timesOf(harnessOfSize(999, 60))
const all = sizes.flatMap((size) =>
  Array.from({ length: harnessesPerSize }, (_, i) => {
    const times = timesOf(harnessOfSize(500 + i, size))
    const list = (ms: number[]) => ms.map((x) => x.toFixed(0)).join(' ')
    console.log(
      `  ${size} nodes: new ${times.first.toFixed(0)} ms; answer ${list(times.answer)}; plan ${list(times.plan)}; retyped ${list(times.again)}`,
    )
    return { size, ...times }
  }),
)
console.log('nodes  unknowns  new circuit  sweep  tenth reading: answer  plan  retyped   (ms, medians)')
for (const size of sizes) {
  const rows = all.filter((one) => one.size === size)
  const cells = [
    median(rows.map((row) => row.nodes)),
    median(rows.map((row) => row.unknowns)),
    ...[
      median(rows.map((row) => row.first)),
      median(rows.map((row) => row.sweep)),
      median(rows.flatMap((row) => row.answer)),
      median(rows.flatMap((row) => row.plan)),
      median(rows.flatMap((row) => row.again)),
    ].map((ms) => ms.toFixed(1)),
  ]
  console.log(cells.map((cell, i) => String(cell).padStart([5, 9, 12, 6, 22, 5, 8][i]!)).join(' '))
}
const at200 = all.filter((one) => one.size === 200)
const answer = quantile(
  at200.flatMap((one) => one.answer),
  0.95,
)
const plan = quantile(
  at200.flatMap((one) => one.plan),
  0.95,
)
const sweepGrowth = exponentOf(all.map((one): [number, number] => [one.nodes, one.sweep]))
const answerGrowth = exponentOf(
  all.flatMap((one) => one.answer.map((ms, i): [number, number] => [one.nodes, ms + one.plan[i]!])),
)
const how = `${at200.flatMap((one) => one.answer).length} vehicles, 95th percentile, warm, processor time`
report('Time of an answer, 200 nodes, 6 conditions, 10 readings', [
  { what: 'full answer', goal: '≤ 20 ms', figure: `${answer.toFixed(0)} ms`, met: answer <= 20, how },
  { what: 'planning', goal: '≤ 100 ms', figure: `${plan.toFixed(0)} ms`, met: plan <= 100, how },
])
const range = `${sizes[0]} to ${sizes.at(-1)} nodes, ${all.length} harnesses`
report('Growth with the circuit', [
  {
    what: 'whole sweep',
    goal: 'exponent ≤ 1.15',
    figure: sweepGrowth.toFixed(2),
    met: sweepGrowth <= 1.15,
    how: range,
  },
  {
    what: 'whole answer with its plan',
    goal: 'exponent ≤ 1.3',
    figure: answerGrowth.toFixed(2),
    met: answerGrowth <= 1.3,
    how: range,
  },
])
