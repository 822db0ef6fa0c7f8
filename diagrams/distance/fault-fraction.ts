import { quotient, type Limits, type Measured } from './measured'
import { possibleFractions } from './possible-fractions'
import { spreadOf } from './spread'

/** What was measured on a shorted wire. Near and far are its two ends; the other end is open in every reading. */
export interface WireReadings {
  /** Ohm of the whole wire by its length and size. */
  drawnOhms: Measured
  /** The same as the meter showed it from end to end, test leads in it. */
  wholeOhms?: Measured | undefined
  /** From that end to what the wire touches, test leads in it. */
  nearOhms?: Measured | undefined
  farOhms?: Measured | undefined
  /** Volts from end to end while a current goes in at that end and out through the short. */
  nearDrop?: { volts: Measured; amps: Measured } | undefined
  farDrop?: { volts: Measured; amps: Measured } | undefined
  /** Ohm of the test leads still in every ohm reading. */
  leads: Limits
}

export type DistanceMethod = 'both-ends' | 'both-drops' | 'drop' | 'one-end'

export interface FaultFraction extends Measured {
  method: DistanceMethod
  sigma: number
  /** How far the formula may be off before it is held against the ends of the wire. */
  reach: number
  /** Ohm of the short itself; null where no ohm reading from both ends says it. */
  faultOhms: number | null
}

/**
 * Where along a wire a short lies, as a part of its length from the near end.
 *
 * With u and v the ohms before and behind the short, R = u + v, F the short's own and l the leads':
 *   ohms from both ends   a = u + F + l,  b = v + F + l   →  u/R = (a − b + R) / 2R     (F and l drop out)
 *   volts at a current    the far piece carries none, so V = I·u   →  u/R = V / (I·R)
 *   volts from both ends  V₁/I₁ = u,  V₂/I₂ = v   →  u/R = u / (u + v)                (R drops out)
 *   ohms from one end     u ≤ a − l: a limit only
 * The value is the surest of these; low and high agree with all of them at once. Null: nothing agrees.
 */
export function faultFraction(readings: WireReadings): FaultFraction | null {
  const { nearOhms: a, farOhms: b, wholeOhms, leads } = readings
  const near = readings.nearDrop && quotient(readings.nearDrop.volts, readings.nearDrop.amps)
  const far = readings.farDrop && quotient(readings.farDrop.volts, readings.farDrop.amps)
  const measured = wholeOhms && {
    value: Math.max(0, wholeOhms.value - (leads.low + leads.high) / 2),
    low: wholeOhms.low - leads.high,
    high: wholeOhms.high - leads.low,
  }
  const whole = surerWhole(readings.drawnOhms, measured)
  const limits = {
    whole: both(readings.drawnOhms, measured),
    near: both({ low: 0, high: a ? a.high - leads.low : Infinity }, near),
    far: both({ low: 0, high: b ? b.high - leads.low : Infinity }, far),
    ...(a && b ? { difference: { low: a.low - b.high, high: a.high - b.low } } : {}),
  }
  const possible = limits.whole.low <= 0 ? null : possibleFractions(limits)
  if (!possible) return null

  const estimates: { method: DistanceMethod; figures: Measured[]; formula: Formula }[] = []
  if (a && b) estimates.push({ method: 'both-ends', figures: [a, b, whole], formula: fromBothEnds })
  if (near && far) estimates.push({ method: 'both-drops', figures: [near, far], formula: fromBothDrops })
  else if (near) estimates.push({ method: 'drop', figures: [near, whole], formula: ([u, r]) => u! / r! })
  else if (far) estimates.push({ method: 'drop', figures: [far, whole], formula: ([v, r]) => 1 - v! / r! })
  const [best] = estimates
    .map(({ method, figures, formula }) => ({
      method,
      value: formula(figures.map((figure) => figure.value)),
      ...spreadOf(figures, formula),
    }))
    .toSorted((one, other) => one.sigma - other.sigma)
  const faultOhms =
    a && b ? Math.max(0, (a.value + b.value - whole.value - leads.low - leads.high) / 2) : null
  if (!best)
    return {
      ...possible,
      method: 'one-end',
      value: (possible.low + possible.high) / 2,
      // Anywhere alike between the limits.
      sigma: (possible.high - possible.low) / Math.sqrt(12),
      reach: (possible.high - possible.low) / 2,
      faultOhms,
    }
  return {
    ...best,
    ...possible,
    value: Math.min(possible.high, Math.max(possible.low, best.value)),
    faultOhms,
  }
}

type Formula = (values: readonly number[]) => number

const fromBothEnds: Formula = ([a, b, r]) => (a! - b! + r!) / (2 * r!)
/** Nothing lost on either side: anywhere. */
const fromBothDrops: Formula = ([u, v]) => (u! + v! > 0 ? u! / (u! + v!) : 0.5)

/** A measured wire beats a drawn one where the meter is good enough for it. */
function surerWhole(drawn: Measured, measured: Measured | undefined): Measured {
  return measured && measured.low > 0 && measured.high - measured.low < drawn.high - drawn.low
    ? measured
    : drawn
}

function both(one: Limits, other: Limits | undefined): Limits {
  if (!other) return { low: one.low, high: one.high }
  return { low: Math.max(one.low, other.low), high: Math.min(one.high, other.high) }
}
