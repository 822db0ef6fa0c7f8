import { controlCombinations } from '@/diagrams/document/condition'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { randomCircuit } from '../support/random-circuit'
import { seededRandom } from '../support/random'
import { takeReading } from '../support/take-reading'

/**
 * How long a whole answer takes as circuits grow: the first one of a circuit (its hypotheses are
 * made), one more reading (as in a trace), and the same readings again. Milliseconds of processor
 * time, median over circuits; judge by the ratios.
 */
const sizes = [12, 50, 200]
const circuitsPerSize = 5
const readingCount = 10

function circuitOfSize(nodes: number, seed: number): Circuit {
  let best: Circuit | undefined
  for (let consumers = 1; consumers < 80; consumers++) {
    const circuit = randomCircuit(seed, consumers)
    if (!best || Math.abs(circuit.nodes.length - nodes) < Math.abs(best.nodes.length - nodes)) best = circuit
    if (circuit.nodes.length > 1.3 * nodes) break
  }
  return best!
}

function someReadings(circuit: Circuit, seed: number): Reading[] {
  const random = seededRandom(seed)
  const combinations = controlCombinations(circuit, 8)
  const sets = candidateReadings(circuit, [sitesOf(circuit)[0]!.id], restCondition).slice(
    0,
    combinations.length + 1,
  )
  const readings: Reading[] = []
  for (let i = 0; readings.length < readingCount && i < 200; i++) {
    const probe = random.pick(random.pick(sets).probes)
    const reading = takeReading(`r${i}`, circuit, probe, undefined, random.next)
    if (reading) readings.push(reading)
  }
  return readings
}

function processorMs(work: () => void): number {
  const before = process.cpuUsage()
  work()
  const used = process.cpuUsage(before)
  return (used.user + used.system) / 1000
}

const median = (list: number[]) => list.toSorted((a, b) => a - b)[Math.floor(list.length / 2)]!

const ask = (circuit: Circuit, readings: Reading[]) =>
  evaluate({ circuit, readings, codes: [], priors: 'trade' })
// Warm up, so that the first size is not charged for compilation.
const warm = circuitOfSize(40, 999)
ask(warm, someReadings(warm, 1))

console.log('nodes  places  first  one more reading  again   (ms of processor time, median of 5)')
for (const size of sizes) {
  const rows = Array.from({ length: circuitsPerSize }, (_, i) => {
    const circuit = circuitOfSize(size, 100 * size + i)
    const readings = someReadings(circuit, i)
    return {
      nodes: circuit.nodes.length,
      places: sitesOf(circuit).length,
      first: processorMs(() => ask(circuit, [])),
      more: processorMs(() => ask(circuit, readings.slice(0, 9))) / 9,
      again: processorMs(() => ask(circuit, readings.slice(0, 9))),
    }
  })
  const of = (key: keyof (typeof rows)[number]) => median(rows.map((row) => row[key]))
  console.log(
    [of('nodes'), of('places'), of('first').toFixed(0), of('more').toFixed(0), of('again').toFixed(0)]
      .map((cell, i) => String(cell).padStart([5, 7, 6, 17, 6][i]!))
      .join(' '),
  )
}
