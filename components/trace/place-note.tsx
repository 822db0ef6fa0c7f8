'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { SiteAnswer } from '@/diagrams/faults/answer'
import { Button } from '../ui/button'
import { VerdictGlyph } from '../ui/verdict-glyph'
import { siteTitle } from './site-words'

/** How one place stands and why, over the foot of the sheet. */
export function PlaceNote({
  circuit,
  site,
  started,
  onClose,
}: {
  circuit: Circuit
  site: SiteAnswer
  started: boolean
  onClose: () => void
}) {
  const [head, rest] = started
    ? headAndRest(site.says)
    : [`${siteTitle(circuit, site.site)}:`, ' no reading yet, any place can be at fault.']
  return (
    <aside
      aria-label="The picked place"
      className="absolute inset-x-3 bottom-16 z-controls flex max-w-xl items-start gap-3 rounded-field border-area border-ink bg-window px-3 py-2 tablet:inset-x-auto tablet:left-5 tablet:bottom-20 laptop:bottom-3"
    >
      {started && <VerdictGlyph verdict={site.verdict} size={26} />}
      <div className="min-w-0 flex-1 text-dense" role="status">
        <p>
          <b>{head}</b>
          {rest}
        </p>
      </div>
      <Button look="text" onClick={onClose}>
        Let go
      </Button>
    </aside>
  )
}

/** Place and verdict, then why: "F14 proved good by R2" and ", if there is one fault." */
function headAndRest(says: string): [string, string] {
  const end = says.search(/[,:]/)
  return end < 0 ? [says, ''] : [says.slice(0, end), says.slice(end)]
}
