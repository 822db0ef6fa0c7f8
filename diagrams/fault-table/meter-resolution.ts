import type { ReadingValue } from '../document/reading-schema'

/** What a table's cell holds: a value, or null where the circuit does not come to rest or nothing is read. */
export type Cell = ReadingValue | null

/** Smallest volts told apart on a 20 V range of a common meter. */
export const voltsResolution = 0.01
/** A meter of 4,000 counts: a tenth of an ohm up to 400, then one count of each range. */
const ohmsCounts = 4000
const leastOhms = 0.1

/** Smallest difference a meter shows between two readings, the greater of them given. */
export function resolutionAt(kind: 'volts' | 'ohms', value: number): number {
  if (kind === 'volts') return voltsResolution
  const decade = Math.ceil(Math.log10(Math.max(value, leastOhms * ohmsCounts) / ohmsCounts) - 1e-12)
  return 10 ** decade
}

/** True when two cells of one column show no difference. */
export function looksSame(kind: 'volts' | 'ohms', a: Cell, b: Cell): boolean {
  if (typeof a !== 'number' || typeof b !== 'number') return a === b
  return Math.abs(a - b) <= resolutionAt(kind, Math.max(Math.abs(a), Math.abs(b)))
}
