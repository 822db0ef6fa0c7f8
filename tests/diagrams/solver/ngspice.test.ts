import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { samples } from '@/diagrams/samples/all-samples'
import { openCase } from '@/diagrams/solver/faulted-case'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import example from '@/tests/fixtures/example-circuit.json'
import { agreeWithNgspice, toldAgreement, type Subject } from '@/tests/support/agree-with-ngspice'
import { everyCase, everyCondition, everyFault } from '@/tests/support/every-fault'
import { seededRandom } from '@/tests/support/random'
import { randomCircuit } from '@/tests/support/random-circuit'
import { randomFault } from '@/tests/support/random-fault'

/** Every combination of controls, and the battery off with everything at rest. */
function conditionsOf(circuit: Circuit, limit: number): Condition[] {
  return [
    ...controlCombinations(circuit, limit).map((controls) => ({ ...restCondition, controls })),
    { ...restCondition, battery: false },
  ]
}

/** At rest, or null when it never comes to rest. */
function subjectOf(
  name: string,
  circuit: Circuit,
  condition: Condition,
  fault?: PlantedFault,
): Subject | null {
  const opened = openCase(circuit, condition, fault)
  if (!opened.ok) throw new Error(`${name}: ${opened.problem.message}`)
  const { given, severity } = opened.value
  const settled = given.settle(severity)
  return settled && { name, given, settled }
}

function agreement(what: string, subjects: Iterable<Subject>) {
  const found = agreeWithNgspice(subjects, seededRandom(20_261_201))
  console.log(toldAgreement(what, found))
  return found
}

const opened = openCircuit(example)
if (!opened.ok) throw new Error('the example circuit does not open')
const drawn = [...samples, opened.value]

describe('the linear equations agree with ngspice', () => {
  it('on every sample, in every combination of controls and with the battery off', () => {
    const subjects = drawn.flatMap((circuit) =>
      conditionsOf(circuit, 1000).map((condition) =>
        subjectOf(`${circuit.title} ${JSON.stringify(condition.controls)}`, circuit, condition),
      ),
    )
    expect(subjects).not.toContain(null)
    const found = agreement(
      'samples',
      subjects.filter((s) => s !== null),
    )
    expect(found.nearest).toBeLessThanOrEqual(1)
  }, 120_000)

  it('on every sample with any fault in any condition, a hundredth of all drawn by chance', () => {
    const random = seededRandom(31)
    const share = Number(process.env.NGSPICE_SHARE ?? 0.01)
    const unrest: string[] = []
    function* some() {
      for (const circuit of samples)
        yield* everyCase(
          circuit,
          () => random.chance(share),
          (name) => unrest.push(name),
        )
    }
    const found = agreement('samples with faults', some())
    const all = samples.reduce((sum, c) => sum + (1 + everyFault(c).length) * everyCondition(c).length, 0)
    console.log(`${found.compared} of ${all}; ${unrest.length} more do not come to rest`)
    expect(found.compared).toBeGreaterThan(0.8 * share * all)
    expect(found.nearest, found.where).toBeLessThanOrEqual(1)
  }, 1_200_000)

  it('on 310 random harnesses, good, faulty, and with the battery off', () => {
    const subjects = Array.from({ length: 310 }, (_, i) => {
      const seed = i + 1
      const random = seededRandom(seed)
      const circuit = randomCircuit(seed)
      const condition = random.pick(conditionsOf(circuit, 100).slice(0, -1))
      const name = `random ${seed}`
      const fault = randomFault(circuit, random)
      const dead = { ...condition, battery: false }
      const faulty = `${name} ${JSON.stringify(fault)}`
      return [
        subjectOf(name, circuit, condition),
        subjectOf(faulty, circuit, condition, fault),
        ...(seed % 4 === 0 ? [subjectOf(`${name} dead`, circuit, dead)] : []),
        ...(seed % 4 === 1 ? [subjectOf(`${faulty} dead`, circuit, dead, fault)] : []),
      ]
    }).flat()
    const found = agreement(
      'random harnesses',
      subjects.filter((s) => s !== null),
    )
    expect(found.compared).toBeGreaterThan(700)
    expect(found.nearest, found.where).toBeLessThanOrEqual(1)
  }, 120_000)
})
