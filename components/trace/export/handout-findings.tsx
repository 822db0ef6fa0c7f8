'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { siteName } from '@/diagrams/document/sites'
import type { Answer } from '@/diagrams/faults/answer'
import type { Trace } from '@/lib/shared/api/traces'
import { headAndRest, modeWords } from '../site-words'

/** Verdict, what is left, what was cleared and under which assumption, what was found and repaired. */
export function HandoutFindings({
  circuit,
  trace,
  answer,
  started,
}: {
  circuit: Circuit
  trace: Trace
  answer: Answer | null
  started: boolean
}) {
  const [head, rest] = headAndRest(answer?.says ?? '')
  const good = answer?.sites.filter((site) => site.verdict === 'proved-good') ?? []
  const firm = good.filter((site) => site.firm)
  const left = answer?.sites.filter((site) => site.verdict === 'in-question') ?? []
  const { finding } = trace
  return (
    <div style={{ fontSize: '15.5px' }}>
      <div style={{ fontSize: '23px', fontWeight: 800, lineHeight: 1.15 }}>
        {started && answer ? head : 'No reading yet'}
      </div>
      {started && rest && <div style={{ marginTop: '6px' }}>{rest}</div>}
      {started && left.length > 0 && left.length <= 12 && (
        <div style={{ marginTop: '6px' }}>
          <b>In question:</b> {left.map((site) => siteName(circuit, site.site)).join(', ')}.
        </div>
      )}
      {started && good.length > 0 && (
        <div style={{ marginTop: '6px' }}>
          {good.length} places cleared if there is one fault: {firm.length} of them by two independent
          readings, {good.length - firm.length} only while every reading is right.
        </div>
      )}
      {finding && (
        <div style={{ marginTop: '10px' }}>
          <b>Found:</b>{' '}
          {finding.site && finding.mode
            ? `${siteName(circuit, finding.site)}, ${modeWords[finding.mode]}`
            : 'nothing wrong'}
          . {finding.repaired ? 'Repaired.' : 'Not repaired yet.'} {finding.note}
        </div>
      )}
    </div>
  )
}
