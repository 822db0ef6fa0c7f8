import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { samples } from '@/diagrams/samples/all-samples'
import { branchAmps, at, unitCurrentIn, voltsAt } from '@/diagrams/solver/case'
import { pinJointOhms } from '@/diagrams/solver/constants'
import { openCase } from '@/diagrams/solver/faulted-case'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { netlistOf } from '@/diagrams/solver/settled-netlist'
import example from '@/tests/fixtures/example-circuit.json'
import { runNgspice, type Deck } from '@/tests/support/ngspice'
import { seededRandom } from '@/tests/support/random'
import { randomCircuit } from '@/tests/support/random-circuit'
import { randomFault } from '@/tests/support/random-fault'

const relativeLimit = 1e-6
const floor = 1e-6

interface Subject {
  name: string
  circuit: Circuit
  condition: Condition
  fault?: PlantedFault
}

/** What both solvers say of one thing: volts or amperes of a live circuit, or what 1 mA does to a dead one. */
interface Pair {
  what: string
  unit: 'V' | 'A' | 'V at 1 mA'
  ours: number
  theirs: number
}

/** Every combination of controls, and the battery off with everything at rest. */
function conditionsOf(circuit: Circuit, limit: number): Condition[] {
  return [
    ...controlCombinations(circuit, limit).map((controls) => ({ ...restCondition, controls })),
    { ...restCondition, battery: false },
  ]
}

/**
 * Solves every subject twice: here, and its linear elements in ngspice. With the battery off
 * there is nothing to see in a dead circuit, so a milliampere is sent through a pair of points
 * instead, as an ohmmeter would.
 */
function compare(subjects: readonly Subject[]) {
  let unstable = 0
  const random = seededRandom(20_261_201)
  const decks: Deck[] = []
  const checks: ((answer: ReturnType<typeof runNgspice>[number]) => Pair[])[] = []
  for (const { name, circuit, condition, fault } of subjects) {
    const opened = openCase(circuit, condition, fault)
    if (!opened.ok) throw new Error(`${name}: ${opened.problem.message}`)
    const { given, severity } = opened.value
    const settled = given.settle(severity)
    if (!settled) {
      unstable++
      continue
    }
    const { network } = given.study
    const netlist = netlistOf(given, settled)
    const deck: Deck = {
      elements: netlist.elements.map((e) => ({ ...e, a: String(e.a), b: String(e.b) })),
    }
    decks.push(deck)
    const points = [...network.unknownOf].filter(([, unknown]) => unknown >= 0)
    if (condition.battery)
      checks.push((answer) => [
        ...points.map(([point, unknown]) => ({
          what: `${name}: ${point}`,
          unit: 'V' as const,
          ours: voltsAt(settled, unknown),
          theirs: answer.volts(String(unknown + 1)),
        })),
        ...netlist.elements
          // The next-to-nothing joint behind a pin is no element of the format; its current is its neighbours'.
          .filter((e) => network.branchIndex.has(e.name) && e.ohms > pinJointOhms)
          .map((e) => ({
            what: `${name}: ${e.name}`,
            unit: 'A' as const,
            ours: branchAmps(given, settled, network.branchIndex.get(e.name)!),
            theirs: answer.amps(e.name),
          })),
      ])
    else {
      const amps = 1e-3
      const into = random.pick(points)[1]
      const outOf = random.chance(0.3) ? -1 : random.pick(points)[1]
      deck.injected = { into: String(into + 1), outOf: String(outOf + 1), amps }
      const perAmp = unitCurrentIn(settled, into, outOf)
      checks.push((answer) =>
        points.map(([point, unknown]) => ({
          what: `${name}: ${point}`,
          unit: 'V at 1 mA' as const,
          ours: amps * at(perAmp, unknown),
          theirs: answer.volts(String(unknown + 1)),
        })),
      )
    }
  }
  const answers = runNgspice(decks)
  const pairs = answers.flatMap((answer, i) => checks[i]!(answer))
  return { compared: decks.length, unstable, pairs }
}

function tell(what: string, outcome: ReturnType<typeof compare>): number {
  const worst = { V: 0, A: 0, 'V at 1 mA': 0 }
  let share = 0
  let where = ''
  for (const { what, unit, ours, theirs } of outcome.pairs) {
    const off = Math.abs(ours - theirs)
    const size = Math.max(Math.abs(ours), Math.abs(theirs))
    const over = Number.isFinite(off) ? off / (relativeLimit * size + floor) : Infinity
    // From microvolts to megavolts (a gigohm to chassis), so told as a share.
    worst[unit] = Math.max(worst[unit], unit === 'V at 1 mA' ? off / Math.max(size, 1e-3) : off)
    if (over > share) [share, where] = [over, `${what}: ${ours} ${unit} here, ${theirs} ${unit} there`]
  }
  const told = (x: number) => x.toExponential(1)
  console.log(
    `${what}: ${outcome.compared} circuits compared with ngspice (${outcome.unstable} more do not come to rest), ` +
      `${outcome.pairs.length} values; worst difference ${told(worst.V)} V, ${told(worst.A)} A, ` +
      `${told(worst['V at 1 mA'])} of the volts at 1 mA; nearest to the limit, ${told(share)} of it: ${where}`,
  )
  return share
}

const opened = openCircuit(example)
if (!opened.ok) throw new Error('the example circuit does not open')
const drawn = [...samples, opened.value]

describe('the linear equations agree with ngspice', () => {
  it('on every sample, in every combination of controls and with the battery off', () => {
    const outcome = compare(
      drawn.flatMap((circuit) =>
        conditionsOf(circuit, 1000).map((condition) => ({
          name: `${circuit.title} ${JSON.stringify(condition.controls)}`,
          circuit,
          condition,
        })),
      ),
    )
    expect(outcome.unstable).toBe(0)
    expect(tell('samples', outcome)).toBeLessThanOrEqual(1)
  }, 120_000)

  it('on 310 random harnesses, good, faulty, and with the battery off', () => {
    const subjects = Array.from({ length: 310 }, (_, i): Subject[] => {
      const seed = i + 1
      const random = seededRandom(seed)
      const circuit = randomCircuit(seed)
      const condition = random.pick(conditionsOf(circuit, 100).slice(0, -1))
      const name = `random ${seed}`
      const fault = randomFault(circuit, random)
      const dead = { ...condition, battery: false }
      const faulty = `${name} ${JSON.stringify(fault)}`
      return [
        { name, circuit, condition },
        { name: faulty, circuit, condition, fault },
        ...(seed % 4 === 0 ? [{ name: `${name} dead`, circuit, condition: dead }] : []),
        ...(seed % 4 === 1 ? [{ name: `${faulty} dead`, circuit, condition: dead, fault }] : []),
      ]
    }).flat()
    const outcome = compare(subjects)
    expect(outcome.compared).toBeGreaterThan(700)
    expect(tell('random harnesses', outcome)).toBeLessThanOrEqual(1)
  }, 120_000)
})
