import { nominalBatteryVolts } from '../solver/constants'

/** Battery volts over 12.6, lowest and highest. */
export interface ScaleRange {
  low: number
  high: number
}

const volts = (low: number, high: number): ScaleRange => ({
  low: low / nominalBatteryVolts,
  high: high / nominalBatteryVolts,
})

/** Until it is measured the battery stands anywhere in here. */
export const restingRange = volts(11.8, 12.8)
export const chargingRange = volts(13.5, 14.8)
export const weakRange = volts(7, 11.8)
