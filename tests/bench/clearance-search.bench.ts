import { sitesOf } from '@/diagrams/document/sites'
import { clearances } from '@/diagrams/faults/clearance'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { samples } from '@/diagrams/samples/all-samples'
import { readFaulty, readingPool } from '../support/clearance-run'
import { findCounterexample } from '../support/find-counterexample'
import { seededRandom } from '../support/random'
import { argument } from './support/arguments'
import { percent } from './support/figures'
import { report } from './support/report'

/**
 * Sites that the evaluator calls proved good, handed to a search with a solver of its own for a fault
 * that fits after all. So that a search which finds nothing means something, it is also asked for the
 * true site, where it has to find one.
 */
const clearancesWanted = argument('clearances', 150)
const from = argument('from', 0)
const seconds = argument('seconds', 150)
const perRun = 4

const ready = samples.map((circuit) => ({
  circuit,
  model: faultModelOf(circuit),
  sites: sitesOf(circuit),
  pool: readingPool(circuit),
}))
let searched = 0
let firm = 0
let found = 0
let trueSites = 0
let trueFound = 0
const end = Date.now() + 1000 * seconds
let run = from
for (; searched < clearancesWanted && Date.now() < end; run++) {
  const random = seededRandom(0xc1ea + run)
  const { circuit, model, sites, pool } = random.pick(ready)
  const site = random.pick(sites)
  const drawn = readFaulty(model.only(site.id), site, pool, run)
  if (!drawn) continue
  const { readings, fault } = drawn
  trueSites++
  if (findCounterexample(circuit, site, readings, random)) trueFound++
  const judged = clearances(
    model,
    weighReadings(model, readings),
    readings,
    sites.map(({ id }) => id),
  )
  // Those that no hypothesis was made for are as interesting as the others.
  const cleared = sites.filter(({ id }) => judged.get(id)!.cleared)
  for (let i = 0; i < perRun && cleared.length > 0; i++) {
    const [one] = cleared.splice(random.whole(0, cleared.length - 1), 1)
    searched++
    if (judged.get(one!.id)!.firm) firm++
    const counter = findCounterexample(circuit, one!, readings, random)
    if (!counter) continue
    found++
    console.log(
      `  run ${run}, ${circuit.title}: ${one!.id} is proved good, but ${JSON.stringify(counter.fault)} at ${counter.restingVolts.toFixed(3)} V (charging ${counter.chargingVolts.toFixed(3)} V), parts ${JSON.stringify([...counter.parts])} gives all of ${JSON.stringify(readings)} (truth ${JSON.stringify(fault)})`,
    )
  }
}
report('Clearances searched for a fault that fits after all', [
  {
    what: 'proved good, and a fault found that fits',
    goal: '0',
    figure: `${found} of ${searched}`,
    met: found === 0,
    how: `runs ${from} to ${run - 1}, ${firm} of them firm`,
  },
  {
    what: 'the same search on the true site finds a fault that fits',
    goal: '',
    figure: percent(trueFound / trueSites, 0),
    met: null,
    how: `${trueSites} runs`,
  },
])
