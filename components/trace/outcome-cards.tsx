'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { NextOutcome } from '@/diagrams/faults/answer'
import { classNames } from '../ui/class-names'
import { leavesWords } from './next-words'

/** Each outcome of the next reading and what it leaves; the one that the typed value falls in is lit. */
export function OutcomeCards({
  circuit,
  outcomes,
  lit,
  outside,
  look,
}: {
  circuit: Circuit
  outcomes: readonly NextOutcome[]
  lit: NextOutcome | null
  outside: boolean
  /** Cards side by side, or rows under one another. */
  look: 'cards' | 'rows'
}) {
  const likeliest = outcomes.toSorted((one, other) => other.probability - one.probability)
  const room = look === 'cards' ? 3 : 2
  // The one that is lit is always among those shown.
  const shown = likeliest.filter(
    (outcome, rank) => outcome === lit || rank < room - (lit && likeliest.indexOf(lit) >= room ? 1 : 0),
  )
  const between = shown.length < 3 && outcomes.some((outcome) => outcome.low !== undefined)
  return (
    <ul
      aria-label="What each outcome leaves"
      className={classNames(
        'grid grid-cols-[minmax(0,1fr)] gap-2',
        look === 'cards' && 'laptop:grid-cols-[repeat(auto-fit,minmax(7.5rem,1fr))]',
      )}
    >
      {shown.map((outcome) => (
        <Outcome
          key={outcome.about}
          lit={outcome === lit}
          about={outcome.about}
          leaves={`leaves ${outcome.leaves.length}`}
          what={leavesWords(circuit, outcome)}
          look={look}
        />
      ))}
      {between && look === 'cards' && (
        <Outcome
          lit={outside}
          about="between"
          leaves="fits no single fault well"
          what="Check the leads, take it again"
          look={look}
          dashed
        />
      )}
    </ul>
  )
}

function Outcome({
  lit,
  about,
  leaves,
  what,
  look,
  dashed = false,
}: {
  lit: boolean
  about: string
  leaves: string
  what: string
  look: 'cards' | 'rows'
  dashed?: boolean
}) {
  return (
    <li
      aria-current={lit ? 'true' : undefined}
      data-lit={lit}
      className={classNames(
        'flex items-center gap-x-3 gap-y-1 rounded-field px-3 transition-colors duration-press',
        look === 'rows' ? 'min-h-10 py-1' : 'py-2',
        look === 'cards' && 'laptop:flex-col laptop:items-start laptop:py-1.5',
        dashed && !lit ? 'border-control border-dashed border-edge' : 'border-control',
        lit ? 'border-ink bg-ink text-on-ink' : 'border-edge bg-panel',
      )}
    >
      <span
        className={classNames(
          'w-24 flex-none leading-tight laptop:w-auto laptop:whitespace-nowrap',
          look === 'rows' ? 'whitespace-nowrap text-body font-bold' : 'text-lead',
          dashed ? '' : 'figures',
        )}
      >
        {about}
      </span>
      <span
        className={classNames(
          'min-w-0 leading-tight',
          look === 'rows' && 'flex flex-1 items-baseline gap-x-2',
        )}
      >
        <b className="block flex-none text-dense">{leaves}</b>
        <span
          className={classNames(
            'text-small',
            look === 'rows' ? 'truncate' : 'line-clamp-2',
            !lit && 'text-ink-2',
          )}
        >
          {what}
        </span>
      </span>
    </li>
  )
}
