'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { siteName } from '@/diagrams/document/sites'
import type { SiteAnswer } from '@/diagrams/faults/answer'
import { classNames } from '../../ui/class-names'
import { VerdictGlyph, verdictWords } from '../../ui/verdict-glyph'
import { modeWords, shortSiteName } from '../site-words'
import { likeliestMode } from '../likeliest-mode'

/** A place left: named, with rungs along its foot; the faulty one in a thick solid frame, with how it failed. */
export function RuleCell({
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
  const mode = site && likeliestMode(site)?.mode
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
        'relative flex h-11 w-full flex-col items-stretch overflow-hidden text-center',
        faulty ? 'border-area border-ink bg-faulty-band p-1' : 'border-control border-ink bg-window',
      )}
    >
      <span
        className={classNames(
          'flex min-h-0 flex-1 items-center justify-center gap-2 px-1 font-bold',
          faulty ? 'text-small' : 'text-[0.8125rem] leading-[1.05]',
          faulty && 'bg-window',
        )}
      >
        {faulty && <VerdictGlyph verdict="faulty" size={20} />}
        <span className={faulty ? 'truncate' : 'line-clamp-2 [overflow-wrap:anywhere]'}>
          {faulty && mode ? `${name}: ${modeWords[mode]}` : name}
        </span>
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
