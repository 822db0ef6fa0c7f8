import type { Condition } from '../document/condition-schema'
import type { Mode } from '../document/sites'

export type Verdict = 'faulty' | 'in-question' | 'proved-good'
export type Outcome = 'located' | 'narrowed' | 'no-fault' | 'two-faults' | 'cannot-be'

export interface ModeAnswer {
  mode: Mode
  probability: number
  /** Most likely severity in ohm; null where the mode has none (open, dead, stuck, weak). */
  ohms: number | null
  /** The other wire of a short between wires. */
  other: string | null
  /** Fuses that this fault has blown: the consequence, not the cause. */
  blows: string[]
}

export interface SiteAnswer {
  site: string
  verdict: Verdict
  /** True when the clearance also holds with any one reading left out. */
  firm: boolean
  /** Ids of readings that suffice to clear the site. */
  clearedBy: string[]
  probability: number
  modes: ModeAnswer[]
  /** How it stands and why, in one or two plain sentences. */
  says: string
}

/** Two faults that explain the readings together, the first with the greater probability of its own. */
export interface PairAnswer {
  sites: [string, string]
  modes: [Mode, Mode]
  /** Most likely severities in ohm; null where the mode has none. */
  ohms: [number | null, number | null]
  /** Ids of the readings that speak of each: those that the other one alone would not show. */
  readings: [string[], string[]]
  probability: number
}

export interface ReadingAnswer {
  id: string
  /** What the good circuit would show: number in V, ohm or A, "OL", true/false or "high"/"low"; null when it cannot settle. */
  expected: number | 'OL' | boolean | 'high' | 'low' | null
  agrees: boolean
  says: string
}

export interface NextOutcome {
  /** "12.5 V", "0.3 ohm", "OL", "works", "does not", "high", "low". */
  about: string
  low?: number
  high?: number
  probability: number
  /** Sites left by this outcome, most probable first. */
  leaves: string[]
}

export interface NextReading {
  kind: 'volts' | 'ohms' | 'amps' | 'works' | 'sees'
  red?: string
  black?: string
  wire?: string
  node?: string
  pin?: string
  condition: Condition
  bits: number
  minutes: number
  outcomes: NextOutcome[]
  /** One plain sentence: where, what, in which condition, what each outcome leaves. */
  says: string
}

/** The evaluator's answer, as circuit-format's page lays it out, with sentences. */
export interface Answer {
  outcome: Outcome
  noFault: number
  sites: SiteAnswer[]
  readings: ReadingAnswer[]
  /** With `cannot-be` only: the reading to take again. */
  reading?: string
  /** With `two-faults` only: the likeliest pairs, at most five. The sites' probabilities are then each site's own and sum to 2. */
  pairs?: PairAnswer[]
  next: NextReading[]
  inseparable: string[][]
  /** True where a moved reading swung: the fault is there for some readings and not for others. */
  comesAndGoes?: boolean
  /** The verdict in plain sentences. */
  says: string
}
