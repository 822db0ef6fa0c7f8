import type { Moment } from './part-state'
import type { VerdictMark } from './wire-stroke'

/** What is shown on top of a plain drawing; everything may be left out. All plain data, computed elsewhere. */
export interface Overlay {
  title?: string
  /** Verdict of each site; sites left out carry no mark. */
  verdicts?: ReadonlyMap<string, VerdictMark>
  /** Letters for the diamonds of faulty sites, where two faults stand together: A and B. */
  letters?: ReadonlyMap<string, string>
  /** Switches moved, relays pulled in, connectors open. */
  moment?: Moment
  /** Volts to chassis shown in plates, by point. */
  volts?: ReadonlyMap<string, number>
  /** Wires that carry current: from→to positive. */
  wireAmps?: ReadonlyMap<string, number>
  /** Readings as flags on their points: "R3", "0.00 V"; the next target is drawn inverted. */
  flags?: readonly ReadingFlag[]
  /** Shorts to be shown as a dashed tail from the wire's middle: to ground, to supply or to another wire. */
  tails?: readonly ShortTail[]
  theme?: 'light' | 'dark'
}

export interface ReadingFlag {
  /** A point, a wire (`wire:w3`) or a node (`node:e21`). */
  at: string
  number: string
  value: string
  /** `odd`: the reading that fits nothing, dashed border; `next`: the target, inverted. */
  style?: 'taken' | 'odd' | 'next'
}

export interface ShortTail {
  wire: string
  to: 'ground' | 'supply' | { wire: string }
  label: string
}
