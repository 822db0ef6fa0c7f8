import { samples } from '@/diagrams/samples/all-samples'
import { voltsBetween } from '@/diagrams/solver/case'
import { deadVolts } from '@/diagrams/solver/constants'
import { readMeter } from '@/diagrams/solver/meter'
import { netlistOf } from '@/diagrams/solver/settled-netlist'
import { probesIn } from '@/diagrams/planner/probes-in'
import { solveBig, subtract, toDouble } from '../support/big-float'
import { everyCase } from '../support/every-fault'
import { harnessOfSize } from '../support/harness-of-size'
import { seededRandom } from '../support/random'
import { argument } from './support/arguments'
import { report } from './support/report'

/**
 * What the meter shows under faults of every kind, in every condition, against the same netlist solved
 * with 320 bits and the meter put in. Cases drawn by `--seed`, a few readings of each.
 */
const cases = argument('cases', 400)
const seed = argument('seed', 1)
const readingsPerCase = 3

const random = seededRandom(seed)
const circuits = [...samples, harnessOfSize(21, 50), harnessOfSize(22, 60)]
let worstVolts = 0
let worstOhms = 0
let wrongOl = 0
let ol = 0
const count = { volts: 0, ohms: 0 }
let where = ''
const perCircuit = Math.ceil(cases / circuits.length)
for (const circuit of circuits) {
  // About as many cases as wanted, spread over all of them.
  const all = everyCaseCount(circuit)
  for (const { name, given, settled } of everyCase(
    circuit,
    () => random.chance(Math.min(1, perCircuit / all)),
    () => {},
  )) {
    const { network, condition } = given.study
    const { nets, elements, netOf } = netlistOf(given, settled)
    const probes = probesIn(circuit, condition)
    for (let i = 0; i < readingsPerCase; i++) {
      const probe = random.pick(probes)
      if (probe.kind !== 'volts' && probe.kind !== 'ohms') continue
      const [a, b] = [netOf.get(probe.red)!, netOf.get(probe.black)!]
      const shown = readMeter(given, settled, probe)
      if (probe.kind === 'volts') {
        const volts = solveBig(nets, [...elements, { a, b, ohms: 10e6, volts: 0 }])
        const off = Math.abs(Number(shown) - toDouble(subtract(volts[a]!, volts[b]!)))
        count.volts++
        if (off > worstVolts) [worstVolts, where] = [off, `${name} ${probe.red} ${probe.black}`]
        continue
      }
      const between = voltsBetween(
        settled,
        network.unknownOf.get(probe.red)!,
        network.unknownOf.get(probe.black)!,
      )
      // A source on the circuit: the figure means nothing.
      if (Math.abs(between) > deadVolts) continue
      const driven = solveBig(nets, elements, [a, b])
      const truth = toDouble(subtract(driven[a]!, driven[b]!))
      count.ohms++
      if ((shown === 'OL') !== truth > 40e6) {
        wrongOl++
        console.log(`  OL wrong: ${name} ${probe.red} ${probe.black}: ${String(shown)}, ${truth} ohm`)
      } else if (shown === 'OL') ol++
      // Below a tenth of a milliohm no meter shows anything.
      else worstOhms = Math.max(worstOhms, Math.abs(Number(shown) - truth) / Math.max(truth, 1e-4))
    }
  }
}

function everyCaseCount(circuit: (typeof circuits)[number]): number {
  let total = 0
  for (const _ of everyCase(
    circuit,
    () => (total++, false),
    () => {},
  ))
    throw new Error('none was asked for')
  return total
}

report('Displayed error against 320 bits', [
  {
    what: 'volts',
    goal: '≤ 1e-6 V',
    figure: `${worstVolts.toExponential(1)} V`,
    met: worstVolts <= 1e-6,
    how: `${count.volts} readings, seed ${seed}; worst ${where}`,
  },
  {
    what: 'ohms',
    goal: '≤ 0.1 %',
    figure: `${(100 * worstOhms).toExponential(1)} %`,
    met: worstOhms <= 1e-3,
    how: `${count.ohms - ol} readings`,
  },
  {
    what: 'wrong OL',
    goal: '0',
    figure: String(wrongOl),
    met: wrongOl === 0,
    how: `${ol} OL, ${count.ohms} in all`,
  },
])
