import type { Reading } from '../document/reading-schema'
import { chargingRange, restingRange } from './battery-range'
import { normalDensity } from './normal'
import { accuracyOf } from './tolerance-rule'
import { nominalBatteryVolts } from '../solver/constants'

/**
 * What a reading shows that was taken at the wrong place, with a lead that did not touch or in the wrong
 * condition: mostly nothing, or the battery; now and then anything. Density per volt, ohm or ampere, or a
 * probability. Guesses; no published figures found. Used where a slip is weighed against a second fault, where
 * it matters that a slip rarely shows just any figure.
 */
export function shownBySlip(reading: Reading): number {
  const { value } = reading
  switch (reading.kind) {
    case 'works':
    case 'sees':
      return 0.5
    case 'volts': {
      if (typeof value !== 'number') return 0.02
      const battery = reading.condition.charging ? chargingRange : restingRange
      const [low, high] = [nominalBatteryVolts * battery.low, nominalBatteryVolts * battery.high]
      const size = Math.abs(value)
      const live = size > low - 0.3 && size < high + 0.1 ? 1 / (high - low + 0.4) : 0
      return 0.35 * nothing(reading, value) + 0.35 * live + 0.3 / 30
    }
    case 'amps':
      return typeof value === 'number' ? 0.6 * nothing(reading, value) + 0.4 / 60 : 0.02
    case 'ohms':
      if (typeof value !== 'number') return 0.4
      return 0.2 * nothing(reading, value) + 0.4 / ((1 + value) * 18)
  }
}

/** As sharp as the meter's own zero. */
function nothing(reading: Reading, value: number): number {
  return normalDensity(value, 0, Math.max(1e-3, accuracyOf(reading).floor / 2))
}
