import { sitesOf } from '@/diagrams/document/sites'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { FaultModel } from '@/diagrams/faults/fault-model'
import { samples } from '@/diagrams/samples/all-samples'
import { clearanceRun, readingPool, type ClearanceRun } from '../support/clearance-run'
import { randomCircuit } from '../support/random-circuit'
import { seededRandom, type Random } from '../support/random'
import { argument } from './support/arguments'
import { percent } from './support/figures'
import { report, type Row } from './support/report'

/**
 * How often the true site is called proved good. Runs are numbered and each number decides all of its
 * run: `--from 71234 --runs 1` repeats one. Tolerances, battery, severities and meter errors are drawn
 * from other distributions than the evaluator assumes, inside the page's bounds. Split a long count
 * over processes by `--from`; `--seconds` ends it early.
 */
const runs = argument('runs', 4000)
const from = argument('from', 0)
const seconds = argument('seconds', 240)
/** Slips are looked at in one run of so many, 0 for none: they cost a look at every other site. */
const slipsEvery = argument('slips-every', 4)
/** Runs of one site in a row, with readings out of a few conditions, so that its predictions are worked out once. */
const block = 256
const conditionsPerBlock = 10
const probesPerCondition = 9

interface Subject {
  circuit: Circuit
  whole: FaultModel
  pool: Probe[][]
}

const known = samples.map(subjectOf)

function subjectOf(circuit: Circuit): Subject {
  return { circuit, whole: new FaultModel(circuit), pool: readingPool(circuit) }
}

interface Count {
  runs: number
  wrong: number
  firmWrong: number
  /** Wrongly cleared, but the fault would not have shown on a vehicle exactly as drawn. */
  unshown: number
}
const none = (): Count => ({ runs: 0, wrong: 0, firmWrong: 0, unshown: 0 })
const within = none()
const slipped = none()
const oneSlip = none()
let idle = 0

function note(count: Count, run: ClearanceRun | null, number: number, kind: string, subject: Subject) {
  if (!run) {
    idle++
    return
  }
  count.runs++
  if (!run.cleared) return
  // With a slip among them the readings may contradict every fault; then nothing is called proved good.
  if (run.slips > 0 && cannotBe(subject, run)) return
  if (!run.showsAsDrawn) {
    count.unshown++
    return
  }
  count.wrong++
  if (run.firm) count.firmWrong++
  if (run.slips > 0) return
  const by = run.readings.filter((reading) => run.clearedBy.includes(reading.id))
  console.log(
    `  wrongly cleared, ${kind}: run ${number} ${subject.circuit.title} ${JSON.stringify(run.fault)} by ${JSON.stringify(by)}`,
  )
}

function cannotBe({ whole }: Subject, { readings }: ClearanceRun): boolean {
  const evidence = weighReadings(whole, readings)
  if (evidence.fits(-1, 0)) return false
  return whole.hypotheses.every(({ cells }, h) => cells.every((_, c) => !evidence.fits(h, c)))
}

/** Fisher and Yates, Statistical tables, 1938. */
function shuffled<T>(list: readonly T[], random: Random): T[] {
  const mixed = [...list]
  for (let i = mixed.length - 1; i > 0; i--) {
    const j = random.whole(0, i)
    ;[mixed[i], mixed[j]] = [mixed[j]!, mixed[i]!]
  }
  return mixed
}

const end = Date.now() + 1000 * seconds
let done = from
for (let start = from - (from % block); start < from + runs && Date.now() < end; start += block) {
  const random = seededRandom(0x5eed + start)
  // One block in eight is of a made-up harness.
  const subject = random.chance(1 / 8)
    ? subjectOf(randomCircuit(random.whole(1, 1e6), 3))
    : random.pick(known)
  const site = random.pick(sitesOf(subject.circuit))
  const model = subject.whole.only(site.id)
  const pool = shuffled(subject.pool, random)
    .slice(0, conditionsPerBlock)
    .map((probes) => shuffled(probes, random).slice(0, probesPerCondition))
  if (model.hypotheses.length === 0) {
    done = Math.min(start + block, from + runs)
    continue
  }
  for (let number = Math.max(from, start); number < Math.min(start + block, from + runs); number++) {
    note(within, clearanceRun(model, site, pool, number), number, 'readings within limits', subject)
    if (slipsEvery > 0 && number % slipsEvery === 0) {
      const seed = number + 0x10000000
      note(slipped, clearanceRun(model, site, pool, seed, { share: 0.005 }), number, '0.5 % slips', subject)
      note(
        oneSlip,
        clearanceRun(model, site, pool, seed, { share: 0, exactly: 1 }),
        number,
        'one slip',
        subject,
      )
    }
    done = number + 1
  }
}

console.log(`\nruns ${from} to ${done - 1}; ${idle} more in which no fault of the site showed`)
const rows: Row[] = [
  {
    what: 'readings within their limits',
    goal: '0 in 100,000',
    figure: `${within.wrong} in ${within.runs}`,
    met: within.wrong === 0,
    how: `runs ${from} to ${done - 1}; ${within.unshown} more where the fault shows on the vehicle but not as drawn`,
  },
]
if (slipsEvery > 0)
  rows.push(
    {
      what: '0.5 % slipped readings, readings at random',
      goal: '≤ 0.05 %',
      figure: percent(slipped.wrong / slipped.runs, 3),
      met: slipped.wrong <= 0.0005 * slipped.runs,
      how: `${slipped.wrong} in ${slipped.runs}`,
    },
    {
      what: 'firm, with one slip',
      goal: '0',
      figure: `${oneSlip.firmWrong} in ${oneSlip.runs}`,
      met: oneSlip.firmWrong === 0,
      how: `${oneSlip.wrong} not firm`,
    },
  )
report('True site called proved good', rows)
