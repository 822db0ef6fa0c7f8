import { figureOf, type Reading } from '../document/reading-schema'
import type { ReadingScope } from './reading-scope'
import { windowsOf, type Windows } from './tolerance-rule'

/** A reading taken while the harness was moved, with what the meter showed at least and at most. */
export type MovedReading = Extract<Reading, { kind: 'volts' | 'ohms' | 'amps' }> & {
  moved: true
  low: number | 'OL'
  high: number | 'OL'
}

export function isMoved(reading: Reading): reading is MovedReading {
  return reading.moved === true && reading.low !== undefined && reading.high !== undefined
}

/** The reading at one end of its swing, as if it had stood there. */
export function atEnd(reading: MovedReading, end: 'low' | 'high'): Reading {
  return { ...reading, value: reading[end] } as Reading
}

/** True when the figures went further than the meter's own limits allow: no fault that stays shows that. */
export function swings(reading: Reading, scope: ReadingScope): boolean {
  if (!isMoved(reading) || figureOf(reading.low) === figureOf(reading.high)) return false
  const [low, high] = [windowsOf(atEnd(reading, 'low'), scope), windowsOf(atEnd(reading, 'high'), scope)]
  return !low.some((a) => high.some((b) => a.low <= b.high && b.low <= a.high))
}

/** From here up, and from here down: what lies between two things that a circuit shows, it may show in passing. */
export function halves(windows: Windows): readonly [Windows, Windows] {
  return [
    windows.map(({ low }) => ({ low, high: Infinity })),
    windows.map(({ high }) => ({ low: -Infinity, high })),
  ]
}
