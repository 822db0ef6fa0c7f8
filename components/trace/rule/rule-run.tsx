'use client'

import { Tick } from '../../ui/glyphs'
import type { RuleEntry } from './rule-layout'

/** A run of places proved good: two rails, a scale stroke for each, one tick for all; or places not yet judged. */
export function RuleRun({
  entry,
  onList,
}: {
  entry: Exclude<RuleEntry, { kind: 'cell' }>
  onList: () => void
}) {
  const count = entry.sites.length
  const each = entry.width / count
  const good = entry.kind === 'good'
  return (
    <button
      type="button"
      onClick={onList}
      aria-label={good ? `${count} proved good` : `${count} places, not judged yet`}
      className="relative block h-11 w-full"
    >
      <svg width="100%" height="44" aria-hidden="true" focusable="false" style={{ display: 'block' }}>
        {each >= 3 &&
          Array.from({ length: count + 1 }, (_, at) => (
            <line
              key={at * each}
              x1={Math.min(Math.max(at * each, 0.5), entry.width - 0.5)}
              x2={Math.min(Math.max(at * each, 0.5), entry.width - 0.5)}
              y1={good ? 8 : 6}
              y2={good ? 16 : 38}
              style={{ stroke: good ? 'var(--edge)' : 'var(--line)', strokeWidth: 1.2 }}
            />
          ))}
        {good ? (
          <>
            <line x1="0" x2="100%" y1="22" y2="22" style={{ stroke: 'var(--good-band)', strokeWidth: 2 }} />
            <line x1="0" x2="100%" y1="32" y2="32" style={{ stroke: 'var(--good-band)', strokeWidth: 2 }} />
          </>
        ) : (
          <line x1="0" x2="100%" y1="38" y2="38" style={{ stroke: 'var(--edge)', strokeWidth: 1.5 }} />
        )}
      </svg>
      {good && entry.width >= 26 && (
        <span className="absolute inset-0 flex items-center justify-center pt-2.5 text-good">
          <span className="bg-panel px-0.5">
            <Tick size={14} />
          </span>
        </span>
      )}
    </button>
  )
}
