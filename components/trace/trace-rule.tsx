'use client'

import { stepWords } from '@/lib/client/evaluator/step-words'
import { nextTitle } from './next-words'
import { RuleCount } from './rule/rule-count'
import { SplitRule } from './rule/split-rule'
import type { TraceSession } from './use-trace-session'

/** The strip under the sheet: how many places are left, and which. */
export function TraceRule({ session }: { session: TraceSession }) {
  const { circuit, done, readings, answer, current, counts, started, located, next } = session
  return (
    <div className="z-rule flex flex-col gap-x-5 border-t-2 border-ink bg-panel px-3 py-1.5 tablet:px-4 laptop:h-[5.75rem] laptop:flex-row laptop:items-center laptop:py-0">
      <RuleCount
        counts={counts}
        started={started}
        outcome={current ? (answer?.outcome ?? null) : null}
        repaired={done && (counts?.faulty ?? 0) > 0}
        foot={
          session.progress
            ? stepWords(session.progress)
            : `${readings.length} ${readings.length === 1 ? 'reading' : 'readings'}`
        }
      />
      <SplitRule
        circuit={circuit}
        legs={session.legs}
        answer={answer}
        started={started}
        next={located ? null : next}
        nextTitle={next ? nextTitle(circuit, next) : ''}
        onPlace={session.setSite}
      />
    </div>
  )
}
