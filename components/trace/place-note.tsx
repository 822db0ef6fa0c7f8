'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { SiteAnswer } from '@/diagrams/faults/answer'
import { Button } from '../ui/button'
import { VerdictGlyph, verdictWords } from '../ui/verdict-glyph'
import { modeWords, siteTitle } from './site-words'

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
  return (
    <aside
      aria-label="The picked place"
      className="absolute inset-x-3 bottom-16 z-controls flex max-w-xl items-start gap-3 rounded-field border-area border-ink bg-window px-3 py-2 tablet:inset-x-auto tablet:left-5 tablet:bottom-20 laptop:bottom-3"
    >
      {started && <VerdictGlyph verdict={site.verdict} size={26} />}
      <div className="min-w-0 flex-1 text-dense" role="status">
        <p className="font-bold">
          {siteTitle(circuit, site.site)}
          {started && `, ${verdictWords[site.verdict]}`}
        </p>
        <p className="text-ink-2">{started ? why(site) : 'No reading yet: any place can be at fault.'}</p>
      </div>
      <Button look="text" onClick={onClose}>
        Let go
      </Button>
    </aside>
  )
}

function why(site: SiteAnswer): string {
  if (site.verdict === 'proved-good') {
    const by = site.clearedBy.length > 0 ? `Proved by ${site.clearedBy.join(', ')}. ` : ''
    return site.firm
      ? `${by}It also holds with any one reading left out. Cleared if there is one fault.`
      : `${by}Cleared if there is one fault and no reading is wrong.`
  }
  const modes = site.modes
    .filter((mode) => mode.probability > 0.005)
    .toSorted((one, other) => other.probability - one.probability)
    .slice(0, 3)
    .map((mode) => `${modeWords[mode.mode]} ${percent(mode.probability)}`)
  return `${percent(site.probability)} likely${modes.length > 0 ? `: ${modes.join(', ')}` : ''}.`
}

function percent(share: number): string {
  if (share < 0.01) return 'under 1 %'
  if (share > 0.99) return 'over 99 %'
  return `${Math.round(share * 100)} %`
}
