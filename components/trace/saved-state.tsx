'use client'

import type { QueueState } from '@/lib/client/queue/offline-queue'
import { clockWords, savedWords } from '@/lib/client/queue/saved-words'
import { Plate } from '../ui/plate'

/** Words at the top right: Saving, Saved 14:02, or the dashed plate of what is kept on this tablet. */
export function SavedState({ state, done }: { state: QueueState; done: boolean }) {
  const words = savedWords(state, clockWords)
  return (
    <span role="status" data-queue={state.kind}>
      {state.kind === 'kept' ? (
        <Plate look="dashed" figures={false} title={state.message}>
          {words}
        </Plate>
      ) : (
        words || (done ? 'Trace closed' : 'Saved')
      )}
    </span>
  )
}
