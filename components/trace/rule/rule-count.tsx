'use client'

import type { Answer } from '@/diagrams/faults/answer'
import type { Counts } from '../verdict-counts'

/** The large figure at the left of the rule. */
export function RuleCount({
  counts,
  started,
  outcome,
  foot,
  repaired = false,
}: {
  counts: Counts | null
  started: boolean
  outcome: Answer['outcome'] | null
  foot: string
  /** The repair is proved: what was faulty is so no longer. */
  repaired?: boolean
}) {
  const { figure, words: found } = countWords(counts, started, outcome)
  const words = repaired ? `${found}, repaired` : found
  return (
    <div className="tablet:max-laptop:flex tablet:max-laptop:items-baseline tablet:max-laptop:gap-3 laptop:w-[9.5rem] laptop:flex-none">
      <p className="flex items-center gap-3">
        <output
          className="figures text-count leading-none laptop:text-[2.5rem]"
          aria-label={`${figure} ${words}`}
        >
          {figure}
        </output>
        <span className="text-dense leading-tight font-bold laptop:max-w-24">{words}</span>
      </p>
      <p className="text-small text-ink-2 max-tablet:hidden laptop:mt-0.5">{foot}</p>
    </div>
  )
}

function countWords(
  counts: Counts | null,
  started: boolean,
  outcome: Answer['outcome'] | null,
): { figure: string; words: string } {
  if (!counts) return { figure: '-', words: 'places' }
  if (!started) return { figure: String(counts.all), words: 'places, none cleared' }
  if (outcome === 'no-fault') return { figure: '0', words: `of ${counts.all} places faulty` }
  if (counts.faulty > 0) return { figure: String(counts.faulty), words: `of ${counts.all} places faulty` }
  return { figure: String(counts.inQuestion), words: `of ${counts.all} places in question` }
}
