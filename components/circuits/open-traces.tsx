import Link from 'next/link'
import type { TraceRow } from '@/lib/shared/api/traces'
import { Plate } from '../ui/plate'
import { ShortTime } from '../ui/short-time'
import { progressWords, SplitStrip } from './split-strip'

/** Unfinished work, newest first. */
export function OpenTraces({ rows }: { rows: TraceRow[] }) {
  if (rows.length === 0) return null
  return (
    <section
      aria-labelledby="open-traces"
      className="border-t-2 border-ink bg-panel px-4 tablet:px-5 pt-4 pb-2"
    >
      <h2 id="open-traces" className="text-lead">
        Traces left open{' '}
        <span className="ml-2 text-body font-normal text-ink-2">pick up where you stopped</span>
      </h2>
      <ul className="mt-2">
        {rows.map((row) => (
          <li key={row.id} className="border-t border-line">
            <Link
              href={`/circuits/${row.circuitId}/traces/${row.id}`}
              className="grid min-h-[3.125rem] grid-cols-[minmax(0,1fr)_auto] items-center gap-x-5 gap-y-1.5 py-2 no-underline hover:bg-window tablet:grid-cols-[minmax(0,1.4fr)_7rem_8rem_minmax(0,1.4fr)_3.5rem] laptop:grid-cols-[minmax(0,1.1fr)_8rem_minmax(0,2fr)_8rem_minmax(0,1.8fr)_4rem]"
            >
              <span className="min-w-0">
                <span className="font-bold">{row.title}</span>
                {row.vehicle && <span className="block truncate text-small text-ink-2">{row.vehicle}</span>}
              </span>
              <span>{row.codes[0] && <Plate>{row.codes[0]}</Plate>}</span>
              <span className="hidden laptop:block">
                {row.progress && <SplitStrip progress={row.progress} />}
              </span>
              <span className="font-bold">{progressWords(row.progress)}</span>
              <span className="hidden laptop:block min-w-0 text-ink-2">{nextWords(row)}</span>
              <span className="hidden tablet:block laptop:hidden min-w-0 text-small text-ink-2">
                {nextWords(row)}
              </span>
              <ShortTime at={row.updatedAt} className="text-right tabular-nums text-ink-2" />
              <span className="tablet:hidden col-span-2 text-small text-ink-2">{nextWords(row)}</span>
            </Link>
          </li>
        ))}
      </ul>
    </section>
  )
}

function nextWords(row: TraceRow): string {
  if (!row.progress) return row.complaint
  if (row.progress.outcome === 'narrowed' && row.progress.next)
    return `Next: ${firstSentence(row.progress.next)}`
  return firstSentence(row.progress.says)
}

/** The place stands first in every sentence of the evaluator; the rest is for the trace itself. */
function firstSentence(text: string): string {
  return text.split('. ')[0]?.replace(/\.$/, '') ?? ''
}
