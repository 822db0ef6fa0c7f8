import type { Reading } from '../document/reading-schema'
import { nominalBatteryVolts } from '../solver/constants'
import { chargingRange, restingRange } from './battery-range'
import { fitsAll, weighReadings, type Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { Odds } from './odds-schema'
import { posteriorOf } from './posterior'
import type { PriorKind } from './request'
import { windowsOf } from './tolerance-rule'

/**
 * Index of the reading that fits no fault and should be taken again, or null when the readings can
 * stand together: one above any source of the circuit, else the one without which the rest is most
 * probable, those whose removal lets some fault fit coming first.
 */
export function readingToSetAside(
  model: FaultModel,
  readings: readonly Reading[],
  evidence: Evidence,
  fits: boolean,
  kind: PriorKind,
  odds?: Odds,
): number | null {
  const above = readings.findIndex((reading) => isAboveSources(model, reading))
  if (above >= 0) return above
  if (fits || readings.length === 0) return null
  const all = [evidence.good, ...evidence.cells.flat()]
  const mends = readings.map((_, out) =>
    all.some((cell) => fitsAll(evidence, cell, readings, (r) => r !== out)),
  )
  const candidates = readings.flatMap((_, r) => (mends.includes(true) && !mends[r] ? [] : [r]))
  let best = candidates[0]!
  let bestLog = -Infinity
  for (const out of candidates) {
    const { logEvidence } = posteriorOf(
      model,
      weighReadings(model, readings, new Set([out])),
      kind,
      null,
      odds,
    )
    if (logEvidence > bestLog) {
      bestLog = logEvidence
      best = out
    }
  }
  return best
}

/** True for volts that no source of the circuit can bring up. */
export function isAboveSources(model: FaultModel, reading: Reading): boolean {
  if (reading.kind !== 'volts') return false
  const windows = windowsOf(reading, { network: model.network })
  if (windows.length === 0) return true
  const least = Math.min(...windows.map(({ low, high }) => (low > 0 ? low : high < 0 ? -high : 0)))
  return least > highestVolts(model, reading.condition.charging)
}

function highestVolts(model: FaultModel, charging: boolean): number {
  const scale = (charging ? chargingRange : restingRange).high
  let most = 0
  let drawn = 0
  for (const node of model.circuit.nodes) {
    if (node.kind === 'battery' || node.kind === 'feed') drawn = Math.max(drawn, node.volts)
    if (node.kind === 'module')
      for (const { circuit } of node.pins)
        if (circuit.type === 'pull-up' || circuit.type === 'source') most = Math.max(most, circuit.volts)
  }
  // A circuit without a source of its own may still carry a stray one.
  return Math.max(most, (drawn || nominalBatteryVolts) * scale)
}
