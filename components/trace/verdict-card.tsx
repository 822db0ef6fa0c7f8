'use client'

import type { ReactNode } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { nodeName } from '@/diagrams/document/points'
import type { Answer } from '@/diagrams/faults/answer'
import { VerdictGlyph } from '../ui/verdict-glyph'
import { ConnectorFace } from './connector-face'
import { likeliestMode } from './likeliest-mode'
import { connectorOf } from './next-words'
import { PairList } from './pair-list'
import { headAndRest, lookFor, siteTitle } from './site-words'

/** What was found: place first, then what, then why; what it cleared, and under which assumption. */
export function VerdictCard({
  circuit,
  answer,
  actions,
}: {
  circuit: Circuit
  answer: Answer
  actions?: ReactNode
}) {
  const faulty = answer.sites.filter((site) => site.verdict === 'faulty')
  const [first] = faulty
  const mode = first && likeliestMode(first)
  const group = first && answer.inseparable.find((sites) => sites.includes(first.site) && sites.length > 1)
  const good = answer.sites.filter((site) => site.verdict === 'proved-good').length
  const point = first && pointOfSite(first.site)
  const face = point ? connectorOf(circuit, point) : null
  const blown = mode?.blows ?? []
  const pair = answer.outcome === 'two-faults' ? answer.pairs?.[0] : undefined
  const [head, told] = headAndRest(answer.says)
  // The bracket below names the places that cannot be told apart; once is enough.
  const rest = group
    ? told.replace(/(^|(?<=[.]\s))[^.]*(?:[.]\d[^.]*)*cannot be told apart[^.]*[.]?/, '').trim()
    : told
  return (
    <section
      aria-labelledby="verdict"
      className="flex min-h-full flex-col gap-2"
      data-outcome={answer.outcome}
    >
      <div className="flex gap-3">
        {first && answer.outcome !== 'no-fault' && !pair && <VerdictGlyph verdict="faulty" size={40} />}
        <div className="min-w-0 flex-1" role="status">
          <h2 id="verdict" className="text-title">
            {head}
          </h2>
          {rest && !pair && <p className="mt-1 text-dense text-ink-2">{rest}</p>}
        </div>
        {face && (
          <ConnectorFace circuit={circuit} connector={face.connector} cavity={face.cavity} width={124} />
        )}
      </div>
      {pair && (
        <>
          <PairList circuit={circuit} pair={pair} />
          <p className="text-dense text-ink-2">
            No single fault gives these readings together. Nothing is proved good while there are two.
          </p>
        </>
      )}
      {group && !pair && (
        <div className="border-x-2 border-b-2 border-ink px-3 pb-1.5 text-dense">
          {group.map((site) => siteTitle(circuit, site)).join(', ')}: these {group.length} cannot be told
          apart by any reading.
        </div>
      )}
      {first && mode && !pair && (
        <div className="rounded-field border-control border-edge bg-panel px-3 py-2 text-dense">
          {blown.length > 0 && (
            <p>
              <b>{blown.map((id) => nameOf(circuit, id)).join(' and ')} has blown because of it.</b> Mend this
              first, then renew the fuse, never a bigger one.
            </p>
          )}
          <p>
            <b>Look for</b> {lookFor(first.site, mode.mode)}.
          </p>
          {good > 0 && (
            <p className="text-ink-2">
              The other {good} {good === 1 ? 'place is' : 'places are'} cleared if there is one fault and no
              reading is wrong.
            </p>
          )}
        </div>
      )}
      {actions && (
        <div className="sticky -bottom-2.5 mt-auto flex flex-wrap gap-2 bg-tray py-2">{actions}</div>
      )}
    </section>
  )
}

function pointOfSite(site: string): string | null {
  const [kind, rest = ''] = site.split(':')
  if (kind === 'contact') return rest.includes('.') ? rest : `${rest}.a`
  return kind === 'pin' ? rest : null
}

function nameOf(circuit: Circuit, id: string): string {
  const node = circuit.nodes.find((one) => one.id === id)
  return node ? nodeName(node) : id
}
