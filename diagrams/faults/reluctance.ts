import { coilVolts, diodeVolts, supplyParts, type Case, type Settled } from '../solver/case'

/** Relays and modules are looked at a little eager and a little reluctant: all that tolerances can do to them. */
export const eager = 0.89
export const reluctant = 1.12

/**
 * True when neither battery nor tolerances can turn a relay, module or diode: far from where it
 * changes, by more than what `eager` and `reluctant` allow together with the battery's range.
 */
export function isCertain(given: Case, settled: Settled): boolean {
  // A weak battery ranges too widely to say.
  if (given.alteration.weak) return false
  const { relays, modules, diodes } = given.study.network
  const far = (part: number) => part < 0.85 || part > 1.22
  return (
    relays.every((relay, i) => far(coilVolts(given, settled, i) / relay.pullIn)) &&
    modules.every((_, i) => supplyParts(given, settled, i).every(far)) &&
    diodes.every((diode, i) => diodeVolts(given, settled, i) < diode.volts / 2)
  )
}
