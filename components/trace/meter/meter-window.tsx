'use client'

import { type ReactNode, type RefObject } from 'react'
import { kindWords, unitWords } from '@/lib/client/meter/reading-words'
import { type MeterState, shownText } from '@/lib/client/meter/meter-state'
import { classNames } from '../../ui/class-names'
import { OhmSign } from '../../ui/glyphs'

/** The figure being typed: the largest thing on the screen. */
export function MeterWindow({
  state,
  onType,
  onEnter,
  field,
  withKeys,
  scale,
  describedBy,
}: {
  state: MeterState
  onType: (text: string) => void
  onEnter: () => void
  field?: RefObject<HTMLInputElement | null>
  /** Keys stand below, so no keyboard is called up on a touch screen. */
  withKeys: boolean
  scale?: ReactNode
  describedBy?: string
}) {
  return (
    <div className="focus-ring flex min-w-0 flex-1 flex-col justify-center rounded-field border-meter border-ink bg-window pb-2">
      <div className="flex items-center gap-2 pr-3">
        <input
          ref={field}
          type="text"
          inputMode={withKeys ? 'none' : 'decimal'}
          autoComplete="off"
          spellCheck={false}
          aria-label={`Meter, ${kindWords[state.kind].toLowerCase()}`}
          aria-describedby={describedBy}
          data-meter-window=""
          value={shownText(state)}
          onChange={(event) => onType(event.target.value)}
          onKeyDown={(event) => {
            if (event.key === 'Enter') {
              event.preventDefault()
              onEnter()
            }
            if (event.key.toLowerCase() === 'l' && !event.ctrlKey && !event.metaKey) {
              event.preventDefault()
              onType('OL')
            }
            if (event.key === 'Escape') event.currentTarget.blur()
          }}
          className={classNames(
            'figures w-full min-w-0 bg-transparent text-right font-bold outline-none',
            'text-meter-phone tablet:text-meter-tablet laptop:text-meter leading-none caret-ink',
          )}
        />
        <span className="flex-none text-title laptop:text-title tablet:text-count">
          {state.kind === 'ohms' ? <OhmSign size={30} title="ohm" /> : unitWords[state.kind]}
        </span>
      </div>
      {scale}
    </div>
  )
}
