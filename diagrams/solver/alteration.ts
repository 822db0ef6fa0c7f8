import { nothingForced, type Forced } from './network'

/** What one fault does to a network: a resistance added in series or across, or parts forced. */
export interface Alteration {
  /** Branches that get a resistance in series; where several are given, at most one conducts at a time. */
  series: readonly number[]
  /** Unknowns that get a resistance between them (−1 is chassis), or null. */
  shunt: readonly [number, number] | null
  /** True when the severity is the battery's volts. */
  weak: boolean
  forced: Forced
}

export const noAlteration: Alteration = { series: [], shunt: null, weak: false, forced: nothingForced }

/** The same fault after it has blown these fuses (branch names). */
export function withBlown(alteration: Alteration, fuseBranches: readonly string[]): Alteration {
  if (fuseBranches.length === 0) return alteration
  const off = new Set([...alteration.forced.off, ...fuseBranches])
  return {
    ...alteration,
    forced: {
      ...alteration.forced,
      off,
      key: `${alteration.forced.key}!${fuseBranches.toSorted().join(',')}`,
    },
  }
}

/** The same key for alterations that change a network alike, whatever they are called. */
export function alterationKey({ series, shunt, weak, forced }: Alteration): string {
  return `${series.join(',')};${shunt?.join(',') ?? ''};${weak};${forced.key}`
}
