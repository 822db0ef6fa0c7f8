/** A figure and the limits it surely lies within, in its own unit. */
export interface Measured {
  value: number
  low: number
  high: number
}

export interface Limits {
  low: number
  high: number
}

/** A meter's figure with its accuracy taken as a limit, of the true value or of the shown one: the wider of the two. */
export function measuredBy(value: number, accuracy: { percent: number; floor: number }): Measured {
  const part = Math.min(accuracy.percent, 50) / 100
  const margin = (part * Math.abs(value) + accuracy.floor) / (1 - part)
  return { value, low: value - margin, high: value + margin }
}

/** Half of the limit, as everywhere in the evaluator. */
export function sigmaOf({ low, high }: Limits): number {
  return (high - low) / 4
}

/** Several figures added. */
export function sum(...terms: readonly Measured[]): Measured {
  return {
    value: terms.reduce((all, term) => all + term.value, 0),
    low: terms.reduce((all, term) => all + term.low, 0),
    high: terms.reduce((all, term) => all + term.high, 0),
  }
}

/** Ohm from volts and amperes, both above zero. */
export function quotient(volts: Measured, amps: Measured): Measured {
  return {
    value: volts.value / amps.value,
    low: Math.max(0, volts.low) / amps.high,
    high: volts.high / amps.low,
  }
}
