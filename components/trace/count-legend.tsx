'use client'

import type { Verdict } from '@/diagrams/faults/answer'
import { VerdictGlyph, verdictWords } from '../ui/verdict-glyph'
import type { Counts } from './verdict-counts'

/** How many places stand where, over the sheet; a dash until the evaluator has answered. */
export function CountLegend({ counts, started }: { counts: Counts | null; started: boolean }) {
  if (!started)
    return (
      <p className="hidden text-dense text-ink-2 tablet:block">
        {counts ? `${counts.all} places, no reading yet` : ''}
      </p>
    )
  const rows: [Verdict, number | null][] = [
    ['faulty', counts?.faulty ?? null],
    ['in-question', counts?.inQuestion ?? null],
    ['proved-good', counts?.good ?? null],
  ]
  return (
    <ul className="hidden flex-wrap gap-x-5 gap-y-1 text-dense tablet:flex">
      {rows.map(([verdict, count]) => (
        <li key={verdict} className="flex items-center gap-2">
          <VerdictGlyph verdict={verdict} size={22} />
          <span>
            <b className="figures">{count ?? '-'}</b> {verdictWords[verdict]}
          </span>
        </li>
      ))}
    </ul>
  )
}
