'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { PairAnswer } from '@/diagrams/faults/answer'
import { faultWords } from '@/diagrams/faults/fault-words'
import { VerdictGlyph } from '../ui/verdict-glyph'

const letters = ['A', 'B'] as const

/** Two faults that stand together: a diamond and a letter each, with the readings that speak of it. */
export function PairList({ circuit, pair }: { circuit: Circuit; pair: PairAnswer }) {
  return (
    <ol className="border-t border-line">
      {letters.map((letter, which) => {
        const site = pair.sites[which as 0 | 1]
        const mode = pair.modes[which as 0 | 1]
        const ohms = pair.ohms[which as 0 | 1]
        const readings = pair.readings[which as 0 | 1]
        return (
          <li key={letter} className="flex min-h-target items-center gap-3 border-b border-line py-1.5">
            <VerdictGlyph verdict="faulty" size={28} />
            <b className="text-lead">{letter}</b>
            <span className="min-w-0 flex-1 font-bold">
              {faultWords(circuit, site, { mode, ohms, other: null })}
            </span>
            <span className="figures text-small text-ink-2">{readings.join(', ')}</span>
          </li>
        )
      })}
    </ol>
  )
}
