import { restCondition } from '@/diagrams/document/condition-schema'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { posteriorOf } from '@/diagrams/faults/posterior'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { forecast } from '@/diagrams/planner/forecast'
import { bestByPlayingOut } from '@/diagrams/planner/play-out'
import { particlesOf } from '@/diagrams/planner/particles'
import { binsOf, bitsOf } from '@/diagrams/planner/split'
import { samples } from '@/diagrams/samples/all-samples'
import { seededRandom, type Random } from '../support/random'
import { argument, flag } from './support/arguments'
import { bestTree, locatedFrom, treeBy, type Instance } from './support/decision-tree'
import { mean } from './support/figures'
import { report } from './support/report'

/**
 * The planner against the optimal tree, on instances small enough to solve exactly: up to nine suspects of
 * a sample with the odds of the trade, every reading that splits them, all readings alike in cost. Expected
 * readings until one suspect holds 0.95. The planner plays out what follows once few places are left;
 * beside it one step of look-ahead by bits alone.
 */
const instances = argument('instances', 80)

const ready = samples.map((circuit) => {
  const model = faultModelOf(circuit)
  const particles = particlesOf(model, posteriorOf(model, weighReadings(model, []), 'trade'))
  const rows = candidateReadings(circuit, [], restCondition).flatMap((set) => {
    const figures = forecast(model, set, particles)
    return set.probes.map((probe, i) => ({ kind: probe.kind, row: figures[i]! }))
  })
  return { particles, rows }
})

function draw({ particles, rows }: (typeof ready)[number], random: Random): Instance | null {
  const count = random.whole(5, 9)
  const chosen = new Set<number>()
  const bySite = new Set<string>()
  for (let tries = 0; chosen.size < count && tries < 200; tries++) {
    const i = random.whole(0, particles.length - 1)
    if (bySite.has(particles[i]!.site)) continue
    bySite.add(particles[i]!.site)
    chosen.add(i)
  }
  const members = [...chosen]
  const weights = members.map((i) => particles[i]!.weight)
  const total = weights.reduce((sum, x) => sum + x, 0)
  const tests = new Map<string, number[]>()
  for (const { kind, row } of rows) {
    const own = Float64Array.from(members, (i) => row[i]!)
    if (own.some(Number.isNaN)) continue
    const bins = binsOf(kind, own)
    if (bins.length < 2) continue
    const outcome = members.map((_, m) => bins.findIndex((bin) => bin.members.includes(m)))
    tests.set(outcome.join(','), outcome)
  }
  const instance = { weights: weights.map((x) => x / total), tests: [...tests.values()] }
  // Suspects that no reading tells apart have no tree to the end.
  const told = new Set(members.map((_, m) => instance.tests.map((test) => test[m]).join(',')))
  return told.size === members.length ? instance : null
}

/** The planner's own measure, over what is left. */
function bits({ weights }: Instance, test: readonly number[], left: readonly number[]): number {
  const outcomes = [...new Set(left.map((m) => test[m]!))]
  const bins = outcomes.map((outcome) => ({
    low: 0,
    high: 0,
    members: left.flatMap((m, i) => (test[m] === outcome ? [i] : [])),
  }))
  const own = Float64Array.from(left, (m) => weights[m]!)
  return bitsOf(bins, own, Int32Array.from(left.keys()), left.length)
}

function mostBits(instance: Instance, left: readonly number[]): readonly number[] | null {
  let best: readonly number[] | null = null
  let most = 0
  for (const test of instance.tests) {
    const found = bits(instance, test, left)
    if (found > most + 1e-12) [best, most] = [test, found]
  }
  return best
}

/** As the planner chooses: by playing out. */
function playedOut({ weights, tests }: Instance, left: readonly number[]): readonly number[] | null {
  const reading = bestByPlayingOut({
    outcomes: tests.map((test) => left.map((m) => test[m]!)),
    weights: left.map((m) => weights[m]!),
    unitOf: left.map((_, i) => i),
    units: left.length,
    foundFrom: locatedFrom,
    costOf: () => 1,
  })
  return reading < 0 ? mostBits({ weights, tests }, left) : tests[reading]!
}

const random = seededRandom(argument('seed', 5))
const planner: number[] = []
const oneStep: number[] = []
for (let tries = 0; planner.length < instances && tries < 40 * instances; tries++) {
  const instance = draw(random.pick(ready), random)
  const least = instance ? bestTree(instance) : 0
  if (!instance || least === 0) continue
  planner.push(treeBy(instance, (left) => playedOut(instance, left)) / least)
  oneStep.push(treeBy(instance, (left) => mostBits(instance, left)) / least)
  if (planner.at(-1)! > 1.05 && flag('tell'))
    console.log(planner.at(-1)!.toFixed(3), JSON.stringify(instance))
}
const how = `${planner.length} instances of 5 to 9 suspects`
const by = (list: number[]) =>
  `by bits alone ${mean(list).toFixed(3)} mean, ${Math.max(...list).toFixed(3)} worst`
report('Readings against the optimal tree', [
  { what: 'mean', goal: '≤ 1.02', figure: mean(planner).toFixed(3), met: mean(planner) <= 1.02, how },
  {
    what: 'worst',
    goal: '≤ 1.05',
    figure: Math.max(...planner).toFixed(3),
    met: Math.max(...planner) <= 1.05,
    how: by(oneStep),
  },
])
