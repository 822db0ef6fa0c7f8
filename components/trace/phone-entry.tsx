'use client'

import { Button } from '../ui/button'
import { EntryScreen } from './entry-screen'
import type { TraceSession } from './use-trace-session'

/** On a phone: what comes next at the foot, and the whole screen that it opens for one reading. */
export function PhoneEntry({ session, onFinish }: { session: TraceSession; onFinish: () => void }) {
  const { circuit, counts, started, located, next, meter } = session
  const { red, wire, node, pin } = meter.state
  const left = !counts
    ? '-'
    : started && counts.faulty > 0
      ? `${counts.faulty} faulty`
      : `${started ? counts.inQuestion : counts.all} in question`
  return (
    <>
      <div className="fixed inset-x-0 bottom-0 z-rule flex gap-2 border-t-2 border-ink bg-panel p-2.5 tablet:hidden">
        {located && (
          <Button look="filled" size="bay" className="flex-1" onClick={onFinish}>
            {session.work.trace.finding ? 'Prove the repair' : 'Record it'}
          </Button>
        )}
        <Button
          look={located ? undefined : 'filled'}
          size="bay"
          className="flex-1"
          onClick={() => {
            if (next && red === null && wire === null && node === null && pin === null)
              session.setMeterFor(next)
            session.setEntering(true)
          }}
        >
          {located ? 'Another reading' : 'Take the reading'}
        </Button>
      </div>
      {session.entering && (
        <EntryScreen
          circuit={circuit}
          title={circuit.title}
          code={session.code}
          left={left}
          next={next}
          meter={meter}
          onClose={() => session.setEntering(false)}
        />
      )}
    </>
  )
}
