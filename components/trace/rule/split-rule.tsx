'use client'

import { useMemo, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { siteName } from '@/diagrams/document/sites'
import type { Answer, NextReading, SiteAnswer } from '@/diagrams/faults/answer'
import { classNames } from '../../ui/class-names'
import { Dialog } from '../../ui/dialog'
import { Tick } from '../../ui/glyphs'
import { VerdictGlyph, verdictWords } from '../../ui/verdict-glyph'
import { modeWords, shortSiteName } from '../site-words'
import { useWidth } from '../use-width'
import { CutMark, LegNote } from './rule-notes'
import { ruleCut } from './rule-cut'
import { layRule, type RuleEntry, type RuleLeg } from './rule-layout'

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
    <div ref={box} className="relative min-w-0 flex-1 select-none pt-6 pb-1" data-testid="split-rule">
      <ol aria-label="Places in path order" className="flex items-start">
        {layout.legs.map((leg, legIndex) => (
          <li
            key={leg.name}
            style={{ width: leg.width, marginLeft: legIndex === 0 ? 0 : 12 }}
            className="flex-none transition-[width] duration-rule"
          >
            <ol className="flex items-stretch">
              {leg.entries.map((entry) => (
                <li
                  key={entryKey(entry)}
                  style={{ width: entry.width }}
                  className="relative flex-none transition-[width] duration-rule"
                >
                  {entry.kind === 'cell' && entry.site === cutBefore && <CutMark title={nextTitle} />}
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
            <LegNote leg={leg} cut={cut} cells={cells} started={started} />
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
      {places && next && !cut && answer?.outcome === 'narrowed' && (
        <p className="absolute left-0 top-0 max-w-full truncate text-small font-bold">
          Next split: {nextTitle}
        </p>
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

function entryKey(entry: RuleEntry): string {
  return entry.kind === 'cell' ? entry.site : `${entry.kind} ${entry.sites[0]}`
}

function RuleCell({
  circuit,
  site,
  id,
  onPlace,
}: {
  circuit: Circuit
  site: SiteAnswer | undefined
  id: string
  onPlace: (site: string) => void
}) {
  const faulty = site?.verdict === 'faulty'
  const mode = site?.modes.toSorted((one, other) => other.probability - one.probability)[0]?.mode
  const name = shortSiteName(circuit, id)
  const spoken = `${siteName(circuit, id)}, ${verdictWords[site?.verdict ?? 'in-question']}${faulty && mode ? `, ${modeWords[mode]}` : ''}`
  return (
    <button
      type="button"
      aria-label={spoken}
      title={spoken}
      data-site={id}
      onClick={() => onPlace(id)}
      className={classNames(
        'relative flex h-11 w-full flex-col items-stretch overflow-hidden bg-window text-center',
        faulty ? 'border-area border-ink p-[3px] bg-faulty-band' : 'border-control border-ink',
      )}
    >
      <span
        className={classNames(
          'flex min-h-0 flex-1 items-center justify-center gap-2 truncate px-1 text-small font-bold',
          faulty && 'bg-window',
        )}
      >
        {faulty && <VerdictGlyph verdict="faulty" size={20} />}
        <span className="truncate">{faulty && mode ? `${name}: ${modeWords[mode]}` : name}</span>
      </span>
      {!faulty && (
        <span
          aria-hidden="true"
          className="block h-2.5 flex-none"
          style={{
            backgroundImage:
              'repeating-linear-gradient(90deg, var(--question-band) 0 3.2px, transparent 3.2px 7.4px)',
          }}
        />
      )}
    </button>
  )
}

/** A run of places proved good: two rails, a scale stroke for each, one tick for all; or places not yet judged. */
function RuleRun({ entry, onList }: { entry: Exclude<RuleEntry, { kind: 'cell' }>; onList: () => void }) {
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
