import type { TraceRow } from '@/lib/shared/api/traces'

type Progress = NonNullable<TraceRow['progress']>

/**
 * A small split rule: the share of places left as one cell with rungs, the cleared ones as two rails. It shows
 * how much is left, not where: that is the trace's own rule.
 */
export function SplitStrip({ progress }: { progress: Progress }) {
  const located = progress.outcome === 'located'
  const share = progress.places === 0 ? 1 : progress.left / progress.places
  return (
    <span aria-hidden="true" className="flex h-5 w-full items-center">
      <span
        className="relative h-5 flex-none border-area border-ink bg-window overflow-hidden"
        style={{
          width: `max(${located ? 0.9 : 1.4}rem, ${(share * 100).toFixed(1)}%)`,
          background: located ? 'var(--faulty-band)' : undefined,
        }}
      >
        {located ? (
          <svg viewBox="0 0 12 16" className="h-full w-full" fill="none" style={{ stroke: 'var(--on-ink)' }}>
            <path d="m3 5 6 6m0-6-6 6" strokeWidth="2" />
          </svg>
        ) : (
          <span
            className="absolute inset-x-0 bottom-0 h-2"
            style={{
              background: 'repeating-linear-gradient(90deg, var(--question-band) 0 3px, transparent 3px 7px)',
            }}
          />
        )}
      </span>
      {progress.left < progress.places && (
        <span
          className="h-[7px] flex-1 border-y-2"
          style={{
            borderColor: 'var(--good-band)',
            maskImage: 'repeating-linear-gradient(90deg, black 0 12px, transparent 12px 14px)',
          }}
        />
      )}
    </span>
  )
}

export function progressWords(progress: TraceRow['progress']): string {
  if (!progress) return 'not evaluated'
  switch (progress.outcome) {
    case 'located':
      return 'Located'
    case 'no-fault':
      return 'Nothing found'
    case 'two-faults':
      return 'Two faults'
    case 'cannot-be':
      return 'Fits no fault'
    case 'narrowed':
      return progress.left === 1 ? '1 place left' : `${progress.left} places left`
  }
}
