import type { QueueState } from './offline-queue'

/** "Saving", "Saved 14:02", "Offline, 3 readings kept on this tablet": the words at the top right. */
export function savedWords(state: QueueState, clock: (milliseconds: number) => string): string {
  switch (state.kind) {
    case 'idle':
      return state.savedAt === null ? '' : `Saved ${clock(state.savedAt)}`
    case 'saving':
      return 'Saving'
    case 'kept':
      return `Offline, ${entriesKept(state.waiting)} kept on this tablet`
    case 'refused':
      return 'Not saved'
  }
}

function entriesKept(count: number): string {
  return count === 1 ? '1 reading' : `${count} readings`
}

/** Hours and minutes as the wall clock shows them, 14:02. */
export function clockWords(milliseconds: number): string {
  const date = new Date(milliseconds)
  return `${String(date.getHours()).padStart(2, '0')}:${String(date.getMinutes()).padStart(2, '0')}`
}
