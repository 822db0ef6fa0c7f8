import type { Reading } from '../document/reading-schema'
import type { Evidence, Included } from './evidence'
import { weighReadings } from './weighed-readings'
import type { FaultModel } from './fault-model'
import { highestVolts } from './highest-volts'
import { slipShare } from './likelihood'
import { logSum } from './log-sum'
import type { Posterior } from './posterior'
import { shownBySlip } from './slip'
import { windowsOf } from './tolerance-rule'

/** Readings that no single fault explains. */
export interface Misfit {
  /** Index of the reading that should be taken again. */
  reading: number
  /** True when it is above any source of the circuit: no fault at all would show it. */
  above: boolean
  /**
   * ln of the probability of one fault and one slipped reading, any whose removal lets some fault fit;
   * −Infinity when none does.
   */
  logSlip: number
}

/**
 * The reading that fits no fault and should be taken again, or null when the readings can stand
 * together: one above any source of the circuit, else the one without which the rest is most
 * probable, those whose removal lets some fault fit coming first.
 */
export function misfitOf(
  model: FaultModel,
  readings: readonly Reading[],
  evidence: Evidence,
  posteriorFor: (evidence: Evidence) => Posterior,
  weigh: typeof weighReadings = weighReadings,
): Misfit | null {
  const above = readings.findIndex((reading) => isAboveSources(model, reading))
  if (above >= 0) return { reading: above, above: true, logSlip: -Infinity }
  const someFits = (included?: Included) =>
    evidence.fits(-1, 0, included) ||
    model.hypotheses.some(({ cells }, h) => cells.some((_, c) => evidence.fits(h, c, included)))
  if (readings.length === 0 || someFits()) return null
  const mends = readings.map((_, out) => someFits((r) => r !== out))
  const mended = mends.includes(true)
  const logs = readings.map((reading, out) => {
    if (mended && !mends[out]) return -Infinity
    const { logEvidence } = posteriorFor(weigh(model, readings, new Set([out])))
    return logEvidence + Math.log(slipShare * shownBySlip(reading))
  })
  return {
    reading: logs.indexOf(Math.max(...logs)),
    above: false,
    logSlip: mended ? logSum(logs) : -Infinity,
  }
}

/** True for volts that no source of the circuit can bring up. */
export function isAboveSources(model: FaultModel, reading: Reading): boolean {
  if (reading.kind !== 'volts') return false
  const windows = windowsOf(reading, { network: model.network })
  if (windows.length === 0) return true
  const least = Math.min(...windows.map(({ low, high }) => (low > 0 ? low : high < 0 ? -high : 0)))
  return least > highestVolts(model.circuit, reading.condition.charging)
}
