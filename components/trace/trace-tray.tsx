'use client'

import { type CSSProperties, type RefObject, useState } from 'react'
import { MeterPanel } from './meter/meter-panel'
import { ReadingsList } from './readings-list'
import { TraceResult } from './trace-result'
import { TrayHandle, type TrayHeight } from './tray-handle'
import type { TraceSession } from './use-trace-session'

/** Band under the rule: readings, meter, next split. Three columns on a laptop, two on a tablet, one on a phone. */
export function TraceTray({
  session,
  field,
  onFinish,
}: {
  session: TraceSession
  field: RefObject<HTMLInputElement | null>
  onFinish: () => void
}) {
  const { work, circuit, readings, answer, current, done, next, others, meter } = session
  const [height, setHeight] = useState<TrayHeight>(276)
  return (
    <div
      style={{ '--tray-height': `${height}px` } as CSSProperties}
      className="relative z-rule grid min-h-0 border-t-2 border-ink bg-tray tablet:h-[38.5rem] tablet:flex-none tablet:grid-cols-2 tablet:grid-rows-[minmax(0,3fr)_minmax(0,2fr)] laptop:h-[var(--tray-height)] laptop:grid-cols-[24.125rem_25.75rem_minmax(0,1fr)] laptop:grid-rows-1"
    >
      <TrayHandle height={height} onPull={setHeight} />
      <div className="min-h-0 min-w-0 overflow-y-auto px-3 py-2.5 tablet:row-start-1 tablet:px-4 laptop:col-start-3 laptop:border-l laptop:border-line">
        <TraceResult
          circuit={circuit}
          work={work}
          answer={answer}
          current={current}
          next={next}
          others={others}
          meter={meter}
          onChoose={session.setMeterFor}
          onFinish={onFinish}
        />
      </div>
      <div className="hidden min-h-0 min-w-0 overflow-y-auto px-4 py-2.5 tablet:col-start-2 tablet:row-span-2 tablet:row-start-1 tablet:flex tablet:border-l tablet:border-line laptop:row-span-1">
        {done ? (
          <p className="text-ink-2">
            This trace is closed: its repair is proved. Start another one to take more readings.
          </p>
        ) : (
          <MeterPanel circuit={circuit} meter={meter} field={field} layout="tray" />
        )}
      </div>
      <div className="flex min-h-0 min-w-0 flex-col border-t border-line tablet:col-start-1 tablet:row-start-2 laptop:row-start-1 laptop:border-t-0">
        <ReadingsList
          circuit={circuit}
          readings={readings}
          answer={current ? answer : null}
          canUndo={!done}
          onUndo={work.undo}
          canRedo={!done && work.canRedo}
          onRedo={work.redo}
        />
      </div>
    </div>
  )
}
