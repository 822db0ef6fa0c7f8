'use client'

import { useRef, useState } from 'react'
import { useKeyCommands } from '@/lib/client/keys/use-key-commands'
import { takesFigure } from '@/lib/client/meter/meter-state'
import type { Trace } from '@/lib/shared/api/traces'
import { circuitModes } from '../operate/circuit-modes'
import { ModeSwitch } from '../shell/mode-switch'
import { RunningHead } from '../shell/running-head'
import { CautionsDialog } from './cautions'
import { FinishDialog } from './finish/finish-dialog'
import { KeysDialog } from './keys-dialog'
import { PhoneEntry } from './phone-entry'
import { SavedState } from './saved-state'
import { TraceBands } from './trace-bands'
import { TraceRule } from './trace-rule'
import { TraceSheet } from './trace-sheet'
import { TraceTray } from './trace-tray'
import { useTraceSession } from './use-trace-session'
import { useTypingIntoMeter } from './use-typing-into-meter'

/** A trace from the first reading to the proof: sheet, split rule, tray. */
export function TraceScreen({ initial }: { initial: Trace }) {
  const session = useTraceSession(initial)
  const { work, circuit, answer, current, done, meter, next } = session
  const { trace } = work
  const [finishing, setFinishing] = useState(false)
  const [showingKeys, setShowingKeys] = useState(false)
  const field = useRef<HTMLInputElement>(null)

  useTypingIntoMeter(field, meter.act, !done && takesFigure(meter.state.kind))
  useKeyCommands({
    m: () => field.current?.focus(),
    n: () => next && session.setMeterFor(next),
    'ctrl+z': () => !done && work.undo(),
    'ctrl+shift+z': () => !done && work.redo(),
    Enter: () => !done && meter.enter(),
    '[': () => session.walk(-1),
    ']': () => session.walk(1),
    Escape: () => session.setSite(null),
    '?': () => setShowingKeys(true),
    '/': () => location.assign('/circuits'),
  })

  const saved = <SavedState state={work.state} done={done} />
  return (
    <div
      className="flex h-dvh flex-col max-tablet:h-auto max-tablet:min-h-dvh max-tablet:pb-20"
      data-outcome={current ? answer?.outcome : 'asking'}
    >
      <RunningHead
        circuit={{
          title: circuit.title,
          vehicle: trace.vehicle || circuit.vehicle,
          code: session.code,
        }}
        saved={saved}
        modes={
          <ModeSwitch
            modes={circuitModes(trace.circuit.id, `/circuits/${trace.circuit.id}/traces/${trace.id}`)}
            current="trace"
          />
        }
      />
      <main id="main" className="flex min-h-0 flex-1 flex-col">
        <TraceBands
          work={work}
          failed={session.failed}
          doubted={answer?.outcome === 'cannot-be' ? (answer.reading ?? null) : null}
        />
        <TraceSheet session={session} />
        <TraceRule session={session} />
        <TraceTray session={session} field={field} onFinish={() => setFinishing(true)} />
      </main>
      {!done && <PhoneEntry session={session} onFinish={() => setFinishing(true)} />}
      <CautionsDialog
        cautions={circuit.cautions}
        answered={work.cautionsAnswered}
        open={session.askingCautions}
        onAnswer={() => {
          work.answerCautions()
          session.setAskingCautions(false)
        }}
        onClose={() => session.setAskingCautions(false)}
      />
      <FinishDialog
        circuit={circuit}
        work={work}
        answer={answer}
        open={finishing}
        onClose={() => setFinishing(false)}
      />
      <KeysDialog open={showingKeys} onClose={() => setShowingKeys(false)} />
    </div>
  )
}
