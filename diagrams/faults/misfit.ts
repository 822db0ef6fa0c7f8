import type { Reading } from '../document/reading-schema'
import type { Evidence, Included } from './evidence'
import { weighReadings } from './weighed-readings'
import { probeKey, type FaultModel } from './fault-model'
import { highestVolts } from './highest-volts'
import { slipShare } from './likelihood'
import { logSum } from './log-sum'
import type { Posterior } from './posterior'
import { shownBySlip } from './slip'
import { windowsOf, type Windows } from './tolerance-rule'

/** Readings that no single fault explains. */
export interface Misfit {
  /** Index of the reading that should be taken again. */
  reading: number
  /** True when it is above any source of the circuit: no fault at all would show it. */
  above: boolean
  /** True when two readings of one thing in one condition exclude each other: two faults would not give both either. */
  contradicts: boolean
  /**
   * ln of the probability of one fault and one slipped reading, any whose removal lets some fault fit;
   * −Infinity when none does.
   */
  logSlip: number
}

/** With more readings than this that may be the wrong one, only so many are tried. */
const mostTried = 24

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
  if (above >= 0) return { reading: above, above: true, contradicts: false, logSlip: -Infinity }
  const someFits = (included?: Included) =>
    evidence.fits(-1, 0, included) ||
    model.hypotheses.some(({ cells }, h) => cells.some((_, c) => evidence.fits(h, c, included)))
  // A harness that was moved may show one thing and then another.
  const contradicts = weigh === weighReadings && contradiction(model, readings)
  if (readings.length === 0 || (!contradicts && someFits())) return null
  const mends = readings.map((_, out) => someFits((r) => r !== out))
  const mended = mends.includes(true)
  let tried = 0
  const logs = readings.map((reading, out) => {
    if ((mended && !mends[out]) || tried >= mostTried) return -Infinity
    tried++
    const { logEvidence } = posteriorFor(weigh(model, readings, new Set([out])))
    return logEvidence + Math.log(slipShare * shownBySlip(reading))
  })
  return {
    reading: logs.indexOf(Math.max(...logs)),
    above: false,
    contradicts,
    logSlip: mended ? logSum(logs) : -Infinity,
  }
}

/** True where the same leads in the same condition show what excludes what they showed before. */
function contradiction(model: FaultModel, readings: readonly Reading[]): boolean {
  const scope = { network: model.network }
  const shown = new Map<string, Windows[]>()
  return readings.some((reading) => {
    const key = probeKey(model.circuit, reading)
    const before = shown.get(key) ?? []
    const windows = windowsOf(reading, scope)
    shown.set(key, [...before, windows])
    // At its threshold a load may do either, but not both at once.
    const either = reading.kind === 'works' || reading.kind === 'sees'
    const meet = (x: Windows, y: Windows) =>
      x.some((a) =>
        y.some((b) =>
          either ? a.low < b.high - 1e-3 && b.low < a.high - 1e-3 : a.low <= b.high && b.low <= a.high,
        ),
      )
    return before.some((other) => !meet(other, windows))
  })
}

/** True for volts that no source of the circuit can bring up. */
export function isAboveSources(model: FaultModel, reading: Reading): boolean {
  if (reading.kind !== 'volts') return false
  const windows = windowsOf(reading, { network: model.network })
  if (windows.length === 0) return true
  const least = Math.min(...windows.map(({ low, high }) => (low > 0 ? low : high < 0 ? -high : 0)))
  return least > highestVolts(model.circuit, reading.condition.charging)
}
