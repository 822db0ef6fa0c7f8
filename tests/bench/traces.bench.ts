import { samples } from '@/diagrams/samples/all-samples'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { readingPool } from '../support/clearance-run'
import { seededRandom } from '../support/random'
import { argument } from './support/arguments'
import { faultDrawer } from './support/draw-fault'
import { mean, percent } from './support/figures'
import { report, type Row } from './support/report'
import { calibrationByChance, calibrationError, traceRun, type Trace } from './support/trace-run'

/**
 * Whole traces on the samples: a fault drawn by the odds of the trade, the readings the planner asks for,
 * 0.5 % of them slips, until the evaluator has its answer. `--runs` traces a circuit, `--seconds` for each
 * circuit at most; the same with odds that are wrong by a factor of three each, a third as many.
 */
const runs = argument('runs', 24)
const from = argument('from', 0)
const seconds = argument('seconds', 20)

interface Told {
  circuit: string
  traces: Trace[]
}

function tracesOf(error: number, count: number): Told[] {
  return samples.map((circuit, c) => {
    const model = faultModelOf(circuit)
    const draw = faultDrawer(model, error, seededRandom(77 + c))
    const pool = readingPool(circuit).flat()
    const traces: Trace[] = []
    const end = Date.now() + 1000 * seconds
    for (let run = from; run < from + count && Date.now() < end; run++) {
      const random = seededRandom(1_000_003 * (c + 1) + run)
      const patient = draw(random)
      const trace = traceRun(circuit, patient, pool, random, 0.005)
      traces.push(trace)
      if (trace.truth.verdict === 'proved-good')
        console.log(
          `  true site proved good${trace.truth.firm ? ', firmly' : ''}: ${circuit.title} run ${run}, ${trace.slips} slips, ${JSON.stringify(patient.fault)}`,
        )
      if (trace.rank > 2 && trace.slips === 0)
        console.log(
          `  true site not among three: ${circuit.title} run ${run} ${JSON.stringify(patient.fault)}: ${trace.answer.outcome}`,
        )
    }
    return { circuit: circuit.title, traces }
  })
}

const within = (rank: number, least: number) => rank >= 0 && rank < least
const share = (traces: readonly Trace[], what: (trace: Trace) => boolean) =>
  traces.filter(what).length / traces.length

const told = tracesOf(1, runs)
const all = told.flatMap(({ traces }) => traces)
const first = told.map(({ traces }) => share(traces, ({ rank }) => within(rank, 1)))
const three = told.map(({ traces }) => share(traces, ({ rank }) => within(rank, 3)))
const counted = `${all.length} traces, ${all.filter(({ slips }) => slips > 0).length} with a slip`
console.log('\nfirst  three  ECE    log score  readings  minutes  bits  traces')
for (const { circuit, traces } of told)
  console.log(
    [
      percent(
        share(traces, ({ rank }) => within(rank, 1)),
        0,
      ),
      percent(
        share(traces, ({ rank }) => within(rank, 3)),
        0,
      ),
      calibrationError(traces.flatMap(({ steps }) => steps)).toFixed(3),
      mean(traces.map(({ probability }) => -Math.log(Math.max(1e-12, probability)))).toFixed(3),
      mean(traces.map(({ readings }) => readings.length)).toFixed(1),
      mean(traces.map(({ minutes }) => minutes)).toFixed(0),
      mean(traces.map(({ bitsBefore, bitsAfter }) => bitsBefore - bitsAfter)).toFixed(2),
      String(traces.length),
    ]
      .map((cell, i) => cell.padEnd([7, 7, 7, 11, 10, 9, 6, 7][i]!))
      .join('') + circuit,
  )

report('Right site, 0.5 % slipped readings', [
  {
    what: 'first, mean of circuits',
    goal: '≥ 98.5 %',
    figure: percent(mean(first)),
    met: mean(first) >= 0.985,
    how: counted,
  },
  {
    what: 'first, worst circuit',
    goal: '≥ 96 %',
    figure: percent(Math.min(...first)),
    met: Math.min(...first) >= 0.96,
  },
  { what: 'among three', goal: '≥ 99.5 %', figure: percent(mean(three)), met: mean(three) >= 0.995 },
])

const wrongOdds = tracesOf(3, Math.ceil(runs / 3))
const firstThen = wrongOdds.map(({ traces }) => share(traces, ({ rank }) => within(rank, 1)))
report('The same with odds wrong by a factor of three', [
  {
    what: 'first, mean of circuits',
    goal: '≥ 97 %',
    figure: percent(mean(firstThen)),
    met: mean(firstThen) >= 0.97,
    how: `${wrongOdds.flatMap(({ traces }) => traces).length} traces`,
  },
])

const finalClaims = ({ traces }: Told) => traces.map(({ steps }) => steps.at(-1)!)
const allClaims = ({ traces }: Told) => traces.flatMap(({ steps }) => steps)
const calibrations = told.map((one) => calibrationError(finalClaims(one)))
const byChance = (claims: ReturnType<typeof allClaims>) =>
  calibrationByChance(claims, seededRandom(9)).toFixed(3)
const pooled = told.flatMap(allClaims)
const pooledEnds = told.flatMap(finalClaims)
const logScore = mean(all.map(({ probability }) => -Math.log(Math.max(1e-12, probability))))
const worst = told[calibrations.indexOf(Math.max(...calibrations))]!
report('Calibration', [
  {
    what: 'expected calibration error of the last claim, worst circuit',
    goal: '≤ 0.015',
    figure: Math.max(...calibrations).toFixed(3),
    met: Math.max(...calibrations) <= 0.015,
    how: `${worst.circuit}, ${worst.traces.length} claims, of which chance alone would give ${byChance(finalClaims(worst))}`,
  },
  {
    what: 'the same, all circuits together',
    goal: '≤ 0.015',
    figure: calibrationError(pooledEnds).toFixed(3),
    met: calibrationError(pooledEnds) <= 0.015,
    how: `${pooledEnds.length} claims, chance ${byChance(pooledEnds)}`,
  },
  {
    what: 'of every claim on the way, all circuits together',
    goal: '',
    figure: calibrationError(pooled).toFixed(3),
    met: null,
    how: `${pooled.length} claims, chance ${byChance(pooled)}`,
  },
  {
    what: 'log score',
    goal: '≤ 0.08 nats',
    figure: `${logScore.toFixed(3)} nats`,
    met: logScore <= 0.08,
    how: counted,
  },
])

const ratios = told.map(
  ({ traces }) =>
    mean(traces.map(({ readings }) => readings.length)) /
    mean(traces.map(({ bitsBefore, bitsAfter }) => bitsBefore - bitsAfter)),
)
const good = all.map(({ answer }) => {
  const sound = answer.sites.filter(({ verdict }) => verdict !== 'faulty')
  return sound.filter(({ verdict }) => verdict === 'proved-good').length / Math.max(1, sound.length)
})
const rows: Row[] = [
  {
    what: 'readings to location ÷ bits of entropy removed, mean',
    goal: '≤ 1.03',
    figure: mean(ratios).toFixed(2),
    met: mean(ratios) <= 1.03,
    how: counted,
  },
  {
    what: 'the same, worst circuit',
    goal: '≤ 1.10',
    figure: Math.max(...ratios).toFixed(2),
    met: Math.max(...ratios) <= 1.1,
    how: told[ratios.indexOf(Math.max(...ratios))]!.circuit,
  },
  {
    what: 'good sites cleared at the end',
    goal: '≥ 75 %',
    figure: percent(mean(good), 0),
    met: mean(good) >= 0.75,
    how: counted,
  },
  {
    what: 'true site proved good, 0.5 % slipped readings',
    goal: '≤ 0.05 %',
    figure: percent(
      share(all, ({ truth }) => truth.verdict === 'proved-good'),
      2,
    ),
    met: share(all, ({ truth }) => truth.verdict === 'proved-good') <= 0.0005,
    how: `${all.filter(({ truth }) => truth.verdict === 'proved-good').length} of ${counted}`,
  },
  {
    what: 'true site firmly proved good, at most one slip',
    goal: '0',
    figure: String(all.filter(({ truth, slips }) => truth.firm && slips <= 1).length),
    met: all.every(({ truth, slips }) => !truth.firm || slips > 1),
    how: counted,
  },
]
report('Readings and clearances of whole traces', rows)
