import type { Reading } from '../document/reading-schema'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { Misfit } from './misfit'
import type { WeightOf } from './pair-member'
import { searchPairs, type PairSearch } from './pair-search'
import type { ReportEvidence } from './report-evidence'
import type { Steps } from './steps'

/**
 * Two faults, or one fault and one slipped reading? Asked only where no single fault, nor none, explains the
 * readings. The pairs, when there are two faults; null when a reading has to be taken again.
 *
 * 1. A value above any source is a slip: no pair of faults shows it either.
 * 2. Where no pair explains all readings, the reading whose removal comes nearest has to be taken again.
 * 3. Where a pair explains them, and no single fault does whichever one reading is set aside, there are two
 *    faults: two slips in one trace are rarer than two faults.
 * 4. Where both hold, the odds decide. A pair has the odds of one fault times those of another, independent one
 *    (`secondFaultShare`), and foretells the doubtful reading to the meter's accuracy. A slip has `slipShare`
 *    a reading, and what a slipped reading shows is mostly nothing or the battery (`shownBySlip`). All pairs together
 *    stand against all single faults with any one reading set aside. Where only one reading speaks of the
 *    second fault both stories are about as likely; it costs half a minute to take it again, and a second fault
 *    believed too early sends someone looking for it. So two faults must be the likelier story by `asked` to 1.
 */
export function* twoFaultsIn(
  model: FaultModel,
  readings: readonly Reading[],
  evidence: Evidence,
  misfit: Misfit,
  weightOf: WeightOf,
  told: ReportEvidence | null = null,
): Steps<PairSearch | null> {
  if (misfit.above) return null
  const search = yield* searchPairs(model, evidence, readings, weightOf, told)
  if (search.boxes.length === 0) return null
  return search.logEvidence - misfit.logSlip > Math.log(asked) ? search : null
}

const asked = 3
