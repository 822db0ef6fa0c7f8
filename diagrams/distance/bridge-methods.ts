/*
 * Loop tests of the cable handbooks: a sound conductor is joined to the faulty one at the far end, and a bridge is
 * balanced with the fault to ground as one of its corners, so that the resistance of the fault itself drops out. The arm Q
 * meets the faulty conductor, P the sound one. They are kept as independent checks of `fault-fraction.ts`.
 */

/** Murray: ohm of the faulty conductor up to the fault, X = loop / (P/Q + 1). */
export function murrayOhms(arms: { p: number; q: number }, loopOhms: number): number {
  return loopOhms / (arms.p / arms.q + 1)
}

/** Varley: with S in series with the faulty conductor, X = (Q · loop − P · S) / (P + Q). */
export function varleyOhms(arms: { p: number; q: number; s: number }, loopOhms: number): number {
  return (arms.q * loopOhms - arms.p * arms.s) / (arms.p + arms.q)
}

/** Metres along a conductor that has this resistance a metre. */
export function metresOfOhms(ohms: number, ohmsPerMetre: number): number {
  return ohms / ohmsPerMetre
}
