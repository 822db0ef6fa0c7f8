'use client'

import { Band } from '../ui/band'
import { Button } from '../ui/button'
import type { TraceWork } from './use-trace'

/** Over the sheet: what was refused, what the evaluator could not do, which reading to take again. */
export function TraceBands({
  work,
  failed,
  doubted,
}: {
  work: TraceWork
  failed: string | null
  doubted: string | null
}) {
  const { state } = work
  const at = doubted === null ? -1 : Number(doubted.slice(1)) - 1
  const reading = work.readings[at]
  return (
    <>
      {state.kind === 'refused' && (
        <Band
          title={state.message}
          actions={
            <Button onClick={work.dropRefused}>
              {state.change.kind === 'put' ? 'Take this reading out' : 'Let it go'}
            </Button>
          }
        >
          Everything else is kept on this tablet and is sent after it.
        </Band>
      )}
      {failed && (
        <Band title="The evaluator could not answer.">
          {failed} The readings are safe; take the last one out or reload the page.
        </Band>
      )}
      {reading && (
        <Band
          kind="caution"
          title={`${doubted} fits no fault in this circuit.`}
          actions={<Button onClick={() => work.remove(reading.id)}>Take {doubted} out, take it again</Button>}
        >
          Check that the controls stood as noted. Nothing counts as proved good until it is taken again.
        </Band>
      )}
    </>
  )
}
