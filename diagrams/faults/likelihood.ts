import type { Reading } from '../document/reading-schema'
import { ohmmeterLimitOhms } from '../solver/constants'
import { normalBelow, smearedDensity } from './normal'
import type { Prediction } from './prediction'
import { loadThreshold, type ReadingScope } from './reading-scope'
import { accuracyOf } from './tolerance-rule'

/** Least error of any meter: volt, ohm and ampere. */
const finest = 1e-6

/** One reading in two hundred is taken at the wrong place or in the wrong condition (a guess). */
export const slipShare = 0.005

/**
 * Likelihood of one reading under one cell in one state, as a function of the battery scale. The severity is
 * taken as even across the cell, the meter's error as normal with half its limit for sigma, and a
 * small share of all readings as slips that may show anything.
 */
export type LikelihoodAt = (scale: number) => number

export function likelihoodOf(
  reading: Reading,
  ends: readonly [Prediction, Prediction] | null,
  scope: ReadingScope,
): LikelihoodAt {
  const slip = slipShare * slipDensity(reading)
  if (!ends || ends.some((end) => end.live)) {
    const flat = slipDensity(reading)
    return () => flat
  }
  const [a, b] = ends
  const kept = 1 - slipShare
  switch (reading.kind) {
    case 'works': {
      const threshold = loadThreshold(scope, reading.node)
      const soft = (end: Prediction, scale: number) =>
        normalBelow((Math.abs(valueAt(end, scale)) - threshold) / Math.max(0.1, end.spread))
      return (scale) => {
        const works = (soft(a, scale) + soft(b, scale)) / 2
        return kept * (reading.value ? works : 1 - works) + slip
      }
    }
    case 'sees': {
      const { threshold } = scope.network.inputs.find((input) => input.point === reading.pin)!
      const soft = (end: Prediction, scale: number) =>
        normalBelow((valueAt(end, scale) - threshold) / Math.max(0.1, end.spread))
      return (scale) => {
        const high = (soft(a, scale) + soft(b, scale)) / 2
        return kept * (reading.value === 'high' ? high : 1 - high) + slip
      }
    }
    case 'ohms':
      if (reading.value === 'OL') {
        const beyond = (end: Prediction) =>
          normalBelow(Math.log(Math.max(1e-9, end.fixed) / ohmmeterLimitOhms) / 0.03)
        const likelihood = kept * ((beyond(a) + beyond(b)) / 2) + slip
        return () => likelihood
      }
      break
  }
  const value = reading.value
  if (typeof value !== 'number') return () => slip
  const { percent, floor } = accuracyOf(reading)
  // No meter is exact: a display ends somewhere.
  const limit = Math.max(finest, (percent / 100) * Math.abs(value) + floor)
  const sigma = Math.sqrt((limit / 2) ** 2 + ((a.spread + b.spread) / 2) ** 2)
  if (a.battery === 0 && b.battery === 0) {
    const likelihood = kept * smearedDensity(value, a.fixed, b.fixed, sigma) + slip
    return () => likelihood
  }
  return (scale) => kept * smearedDensity(value, valueAt(a, scale), valueAt(b, scale), sigma) + slip
}

function valueAt(prediction: Prediction, scale: number): number {
  return scale * prediction.battery + prediction.fixed
}

/** Density of what a slip may show: even over 30 V or 60 A, log-even over ohms with OL one in twenty, either way for the rest. */
function slipDensity(reading: Reading): number {
  switch (reading.kind) {
    case 'volts':
      return 1 / 30
    case 'amps':
      return 1 / 60
    case 'ohms':
      return reading.value === 'OL' ? 0.05 : 0.95 / ((1 + reading.value) * 18)
    default:
      return 0.5
  }
}
