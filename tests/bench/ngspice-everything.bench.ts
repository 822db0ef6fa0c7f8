import { samples } from '@/diagrams/samples/all-samples'
import { agreeWithNgspice, toldAgreement } from '../support/agree-with-ngspice'
import { everyCase } from '../support/every-fault'
import { seededRandom } from '../support/random'
import { argument, flag } from './support/arguments'
import { report } from './support/report'

/**
 * The settled linear netlists of every sample, every fault and every condition, solved once more by
 * ngspice: about 117,000 of them with `--all`, else a share drawn by `--seed`.
 */
const share = flag('all') ? 1 : argument('share', 0.1)
const seed = argument('seed', 1)

const random = seededRandom(seed)
let total = 0
let nearest = 0
const rows = samples.map((circuit) => {
  let unrest = 0
  const found = agreeWithNgspice(
    everyCase(
      circuit,
      () => random.chance(share),
      () => unrest++,
    ),
    random,
  )
  total += found.compared
  nearest = Math.max(nearest, found.nearest)
  console.log(`${toldAgreement(circuit.title, found)}; ${unrest} more do not come to rest`)
  return {
    what: circuit.title,
    goal: 'within 1e-6 relative, 1e-6 floor',
    figure: `${found.nearest.toExponential(1)} of that at worst`,
    met: found.nearest <= 1,
    how: `${found.compared} netlists, ${found.values} values, worst ${found.worst.V.toExponential(1)} V, ${found.worst.A.toExponential(1)} A${found.referred > 0 ? `; ${found.referred} volts of floating parts settled by 320 bits` : ''}`,
  }
})
report(
  `Agreement with ngspice: ${total} netlists, ${share === 1 ? 'all' : `${share} of all, seed ${seed}`}`,
  rows,
)
