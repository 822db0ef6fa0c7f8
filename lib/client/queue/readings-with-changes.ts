import type { Reading } from '@/diagrams/document/reading-schema'
import type { Change } from './kept-changes'

/** The readings as the person entered them: the server's, with what still waits on this tablet put on top. */
export function readingsWithChanges(stored: readonly Reading[], changes: readonly Change[]): Reading[] {
  let readings = [...stored]
  for (const change of changes) {
    if (change.kind === 'put') {
      const at = readings.findIndex((reading) => reading.id === change.reading.id)
      if (at < 0) readings.push(change.reading)
      else readings[at] = change.reading
    } else if (change.kind === 'remove') {
      readings = readings.filter((reading) => reading.id !== change.readingId)
    }
  }
  return readings
}
