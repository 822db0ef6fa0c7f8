import type { Reading } from '@/diagrams/document/reading-schema'

/** "R4": how a reading is named on the drawing, in the tray and in every sentence. */
export function readingNumber(index: number): string {
  return `R${index + 1}`
}

/** Readings under the names they have on screen, so that every sentence of the answer can be shown as it stands. */
export function numberedReadings(readings: readonly Reading[]): Reading[] {
  return readings.map((reading, index) => ({ ...reading, id: readingNumber(index) }))
}
