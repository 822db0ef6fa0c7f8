import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf, type FaultModel } from '@/diagrams/faults/fault-model'
import { posteriorOf, siteProbabilities, type Posterior } from '@/diagrams/faults/posterior'
import { minutesFor, workplaceAfter } from '@/diagrams/planner/cost'
import { planNext } from '@/diagrams/planner/plan-next'
import { halfSplit } from '@/diagrams/planner/policies/half-split'
import { randomPolicy } from '@/diagrams/planner/policies/random-policy'
import type { Policy } from '@/diagrams/planner/policies/policy'
import { walk } from '@/diagrams/planner/policies/walk'
import { samples } from '@/diagrams/samples/all-samples'
import { seededRandom } from '../support/random'
import { shownBy } from '../support/take-reading'
import { argument } from './support/arguments'
import { faultDrawer, type Patient } from './support/draw-fault'
import { mean } from './support/figures'
import { report } from './support/report'

/**
 * The planner against half-split, walking from the supply and readings at random, on the same faulty
 * vehicles with the same evaluator: readings and minutes until 0.95 lies on the site, or on the group that
 * the planner could not tell apart. What is not located after forty readings counts as forty.
 */
const runs = argument('runs', 5)
const from = argument('from', 0)
const seconds = argument('seconds', 20)
const mostReadings = 40
const locatedFrom = 0.95

interface Way {
  readings: number
  minutes: number
  located: boolean
}

function follow(
  model: FaultModel,
  patient: Patient,
  choose: (known: { posterior: Posterior; readings: Reading[] }) => Probe | null,
  located: (posterior: Posterior) => boolean,
  seed: number,
): Way {
  const { circuit } = model
  const { next } = seededRandom(seed)
  const readings: Reading[] = []
  let minutes = 0
  // A probe the vehicle gives no figure for is not asked for twice.
  for (let asked = 0; asked < 2 * mostReadings; asked++) {
    const posterior = posteriorOf(model, weighReadings(model, readings), 'trade')
    if (located(posterior)) return { readings: readings.length, minutes, located: true }
    if (readings.length >= mostReadings) break
    const probe = choose({ posterior, readings })
    const truth = probe && patient.vehicle.read(probe)
    if (!probe || truth === null) break
    minutes += minutesFor(circuit, probe, workplaceAfter(circuit, readings))
    const value = shownBy(probe, truth, next)
    readings.push(readingSchema.parse({ id: `r${readings.length + 1}`, ...probe, value }))
  }
  return {
    readings: mostReadings,
    minutes: (minutes * mostReadings) / Math.max(1, readings.length),
    located: false,
  }
}

const holds = (model: FaultModel, posterior: Posterior, groups: readonly (readonly string[])[]): boolean => {
  const probabilities = siteProbabilities(model, posterior)
  const whole = (group: readonly string[]) =>
    group.reduce((sum, site) => sum + (probabilities.get(site) ?? 0), 0)
  return (
    Math.max(...probabilities.values()) >= locatedFrom || groups.some((group) => whole(group) >= locatedFrom)
  )
}

const names = ['planner', 'half-split', 'walk', 'random'] as const
const ways: Record<(typeof names)[number], Way[]> = { planner: [], 'half-split': [], walk: [], random: [] }

samples.forEach((circuit, c) => {
  const model = faultModelOf(circuit)
  const draw = faultDrawer(model, 1, seededRandom(77 + c))
  const end = Date.now() + 1000 * seconds
  for (let run = from; run < from + runs && Date.now() < end; run++) {
    const seed = 2_000_003 * (c + 1) + run
    const patient = draw(seededRandom(seed))
    let groups: string[][] = []
    const planned = follow(
      model,
      patient,
      ({ posterior, readings }) => {
        const plan = planNext(model, posterior, readings)
        groups = plan.inseparable
        return plan.next[0]?.probe ?? null
      },
      (posterior) => holds(model, posterior, groups),
      seed,
    )
    ways.planner.push(planned)
    const policies: [(typeof names)[number], Policy][] = [
      ['half-split', halfSplit],
      ['walk', walk],
      ['random', randomPolicy(seed)],
    ]
    for (const [name, policy] of policies)
      ways[name].push(
        follow(
          model,
          patient,
          (known) => policy({ model, ...known }),
          (posterior) => holds(model, posterior, groups),
          seed,
        ),
      )
  }
})

console.log('\npolicy      readings  minutes  located   (means)')
for (const name of names) {
  const list = ways[name]
  console.log(
    `${name.padEnd(11)} ${mean(list.map((way) => way.readings))
      .toFixed(2)
      .padStart(8)} ${mean(list.map((way) => way.minutes))
      .toFixed(1)
      .padStart(8)} ${list.filter((way) => way.located).length} of ${list.length}`,
  )
}
const against = (name: (typeof names)[number], what: 'readings' | 'minutes') =>
  mean(ways.planner.map((way) => way[what])) / mean(ways[name].map((way) => way[what]))
const how = `${ways.planner.length} traces of the samples`
report(
  'The planner against other ways of choosing',
  (
    [
      ['half-split', 'readings', 0.63],
      ['walk', 'readings', 0.29],
      ['half-split', 'minutes', 0.5],
      ['walk', 'minutes', 0.33],
    ] as const
  ).map(([name, what, goal]) => ({
    what: `${what} against ${name}`,
    goal: `≤ ${goal}`,
    figure: against(name, what).toFixed(2),
    met: against(name, what) <= goal,
    how,
  })),
)
