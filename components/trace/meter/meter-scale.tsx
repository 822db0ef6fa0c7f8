'use client'

import type { NextOutcome } from '@/diagrams/faults/answer'

/** A ruled scale under the figure: a frame for each outcome of the next split, a pointer at what is typed. */
export function MeterScale({
  outcomes,
  most,
  value,
}: {
  outcomes: readonly NextOutcome[]
  most: number
  value: number | null
}) {
  if (most <= 0) return null
  const at = (volts: number) => `${Math.min(100, Math.max(0, (volts / most) * 100))}%`
  return (
    <div aria-hidden="true" className="relative mx-3 h-5 border-b-[1.5px] border-ink">
      {Array.from({ length: 13 }, (_, tick) => (
        <span
          key={tick / 12}
          className="absolute bottom-0 w-px bg-ink"
          style={{ left: `${(tick / 12) * 100}%`, height: tick % 4 === 0 ? 10 : 6 }}
        />
      ))}
      {outcomes
        .filter((outcome) => outcome.high !== undefined && outcome.low !== undefined)
        .map((outcome) => (
          <span
            key={outcome.about}
            className="absolute -bottom-1 h-4 rounded-plate border-area border-ink bg-window"
            style={{
              left: at(outcome.low ?? 0),
              width: `max(10px, ${Math.min(100, (((outcome.high ?? 0) - Math.max(0, outcome.low ?? 0)) / most) * 100)}%)`,
            }}
          />
        ))}
      {value !== null && value >= 0 && value <= most * 1.05 && (
        <svg
          width="16"
          height="11"
          viewBox="0 0 16 11"
          className="absolute -bottom-1.5 -ml-2"
          style={{ left: at(value) }}
          focusable="false"
        >
          <path d="M8 0 16 11H0z" style={{ fill: 'var(--ink)' }} />
        </svg>
      )}
    </div>
  )
}
