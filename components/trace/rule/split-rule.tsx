'use client'

import { useMemo, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { siteName } from '@/diagrams/document/sites'
import type { Answer, NextReading } from '@/diagrams/faults/answer'
import { Dialog } from '../../ui/dialog'
import { VerdictGlyph, verdictWords } from '../../ui/verdict-glyph'
import { useWidth } from '../use-width'
import { CutMark, CutTitle, LegNote } from './rule-notes'
import { ruleCut } from './rule-cut'
import { RuleCell } from './rule-cell'
import { layRule, legGap, placeOnRule, type RuleEntry, type RuleLeg, type RuleLegLayout } from './rule-layout'
import { RuleRun } from './rule-run'

/** Every place in path order: those left drawn wide, those proved good narrow, and where the next reading cuts. */
export function SplitRule({
  circuit,
  legs,
  answer,
  started,
  next,
  nextTitle,
  onPlace,
}: {
  circuit: Circuit
  legs: readonly RuleLeg[]
  answer: Answer | null
  started: boolean
  next: NextReading | null
  nextTitle: string
  onPlace: (site: string) => void
}) {
  const [box, width] = useWidth<HTMLDivElement>(900)
  const [listing, setListing] = useState(false)
  const bySite = useMemo(() => new Map((answer?.sites ?? []).map((site) => [site.site, site])), [answer])
  const places = started && answer ? bySite : null
  const layout = useMemo(() => layRule(legs, places, width), [legs, places, width])
  const cells = layout.legs.flatMap((leg) =>
    leg.entries.flatMap((entry) => (entry.kind === 'cell' ? [entry.site] : [])),
  )
  const cut = places && next && layout.more.length === 0 ? ruleCut(cells, next.outcomes) : null
  const cutBefore = cut ? cells[cut.after] : undefined

  return (
    <div ref={box} className="relative min-w-0 flex-1 select-none pt-5" data-testid="split-rule">
      <ol aria-label="Places in path order" className="flex items-start">
        {layout.legs.map((leg, legIndex) => (
          <li
            key={legKey(leg)}
            style={{ width: leg.width, marginLeft: legIndex === 0 ? 0 : legGap }}
            className="flex-none transition-[width] duration-rule"
          >
            <ol className="flex items-stretch">
              {leg.entries.map((entry) => (
                <li
                  key={entryKey(entry)}
                  style={{ width: entry.width }}
                  className="relative flex-none transition-[width] duration-rule"
                >
                  {entry.kind === 'cell' && entry.site === cutBefore && <CutMark />}
                  {entry.kind === 'cell' ? (
                    <RuleCell
                      circuit={circuit}
                      site={bySite.get(entry.site)}
                      id={entry.site}
                      onPlace={onPlace}
                    />
                  ) : (
                    <RuleRun entry={entry} onList={() => setListing(true)} />
                  )}
                </li>
              ))}
            </ol>
            <LegNote leg={leg} cut={cut} cells={cells} judged={places !== null} />
          </li>
        ))}
        {layout.more.length > 0 && (
          <li style={{ width: layout.moreWidth }} className="flex-none pl-2">
            <button
              type="button"
              onClick={() => setListing(true)}
              className="h-11 w-full rounded-field border-control border-edge bg-window px-1 text-small font-bold"
            >
              and {layout.more.length} more
            </button>
          </li>
        )}
      </ol>
      {places && next && answer?.outcome === 'narrowed' && (
        <CutTitle
          title={nextTitle}
          cutAt={cutBefore === undefined ? null : placeOnRule(layout, cutBefore)}
          width={width}
        />
      )}
      <Dialog open={listing} onClose={() => setListing(false)} title="Every place">
        <ul className="max-h-[60dvh] overflow-y-auto border-t border-line">
          {legs
            .flatMap((leg) => leg.sites)
            .toSorted(
              (one, other) => (bySite.get(other)?.probability ?? 0) - (bySite.get(one)?.probability ?? 0),
            )
            .map((id) => {
              const site = bySite.get(id)
              return (
                <li key={id}>
                  <button
                    type="button"
                    onClick={() => {
                      setListing(false)
                      onPlace(id)
                    }}
                    className="flex min-h-target w-full items-center gap-3 border-b border-line text-left"
                  >
                    {started && site ? <VerdictGlyph verdict={site.verdict} size={20} /> : null}
                    <span className="flex-1">{siteName(circuit, id)}</span>
                    {started && site && (
                      <span className="text-small text-ink-2">{verdictWords[site.verdict]}</span>
                    )}
                  </button>
                </li>
              )
            })}
        </ul>
      </Dialog>
    </div>
  )
}

/** Several legs may end in the same part and bear its name; a place is in one leg only. */
function legKey(leg: RuleLegLayout): string {
  const [first] = leg.entries
  return first ? entryKey(first) : leg.name
}

function entryKey(entry: RuleEntry): string {
  return entry.kind === 'cell' ? entry.site : `${entry.kind} ${entry.sites[0]}`
}
