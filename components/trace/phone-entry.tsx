'use client'

import { Button } from '../ui/button'
import { EntryScreen } from './entry-screen'
import type { TraceSession } from './use-trace-session'

/** On a phone: the button at the foot, and the whole screen that it opens for one reading. */
export function PhoneEntry({ session }: { session: TraceSession }) {
  const { circuit, counts, started, next, meter } = session
  const { red, wire, node } = meter.state
  const left = !counts
    ? '-'
    : started && counts.faulty > 0
      ? `${counts.faulty} faulty`
      : `${started ? counts.inQuestion : counts.all} in question`
  return (
    <>
      <div className="fixed inset-x-0 bottom-0 z-rule border-t-2 border-ink bg-panel p-2.5 tablet:hidden">
        <Button
          look="filled"
          size="bay"
          className="w-full"
          onClick={() => {
            if (next && red === null && wire === null && node === null) session.setMeterFor(next)
            session.setEntering(true)
          }}
        >
          Take the reading
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
