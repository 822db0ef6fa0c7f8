'use client'

import { type Ref, useMemo } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { siteName } from '@/diagrams/document/sites'
import type { Reading } from '@/diagrams/document/reading-schema'
import { verdictGlyph } from '@/diagrams/drawing/verdict-mark'
import type { VerdictMark } from '@/diagrams/drawing/wire-stroke'
import { bandStrokes } from '@/diagrams/drawing/wire-stroke'
import type { Answer } from '@/diagrams/faults/answer'
import { conditionWords, valueWords } from '@/lib/client/meter/reading-words'
import { readingNumber } from '@/lib/client/evaluator/numbered-readings'
import type { Trace } from '@/lib/shared/api/traces'
import { InksContext, printInks } from '../../canvas/inks'
import { Primitives } from '../../canvas/primitives'
import { StaticDrawing } from '../../canvas/static-drawing'
import { Mark } from '../../ui/wordmark'
import { cautionWords, makerFirst, meterRules } from '../caution-words'
import { modeWords, siteTitle } from '../site-words'
import { traceOverlay } from '../trace-overlay'
import { HandoutReadings } from './handout-readings'

const widthPixels = 1400

/** The sheet that leaves the product: drawing with marks and flags, readings, verdict, cautions. Always on white. */
export function HandoutSheet({
  circuit,
  trace,
  readings,
  answer,
  date,
  sheetRef,
}: {
  circuit: Circuit
  trace: Trace
  readings: readonly Reading[]
  answer: Answer | null
  date: Date
  sheetRef: Ref<HTMLDivElement>
}) {
  const overlay = useMemo(
    () =>
      traceOverlay({ circuit, readings, answer, condition: readings.at(-1)?.condition ?? null, next: null }),
    [circuit, readings, answer],
  )
  const { paint } = printInks
  const rule = `2px solid ${paint('ink')}`
  return (
    <div
      ref={sheetRef}
      data-testid="handout-sheet"
      style={{
        width: widthPixels,
        padding: '32px 40px 24px',
        boxSizing: 'border-box',
        background: 'white',
        color: paint('ink'),
        fontFamily: printInks.text,
        fontSize: '16px',
        lineHeight: 1.35,
      }}
    >
      <div style={{ display: 'flex', alignItems: 'flex-end', justifyContent: 'space-between', gap: '24px' }}>
        <div>
          <div style={{ fontSize: '36px', fontWeight: 800, lineHeight: 1.15 }}>{circuit.title}</div>
          <div style={{ fontSize: '17px', marginTop: '6px' }}>
            {[trace.vehicle || circuit.vehicle, trace.complaint].filter(Boolean).join('. ')}
          </div>
        </div>
        <div style={{ textAlign: 'right', fontSize: '16px' }}>
          {trace.codes.map((code) => (
            <span
              key={code}
              style={{
                display: 'inline-block',
                border: `1.5px solid ${paint('ink')}`,
                borderRadius: '3px',
                padding: '2px 10px',
                margin: '0 0 6px 8px',
                fontFamily: printInks.figures,
                fontWeight: 700,
                fontSize: '18px',
              }}
            >
              {code}
            </span>
          ))}
          <div>
            traced by {trace.by}, {dateWords(date)}
          </div>
        </div>
      </div>
      <div style={{ borderTop: rule, marginTop: '12px', paddingTop: '4px' }}>
        <div style={{ borderTop: `1px solid ${paint('ink')}` }} />
      </div>
      <div style={{ padding: '12px 0' }}>
        <StaticDrawing circuit={circuit} overlay={overlay} width={widthPixels - 80} mostHeight={620} />
      </div>
      <KeyStrip />
      <div style={{ display: 'flex', gap: '36px', marginTop: '16px' }}>
        <div style={{ width: '38%' }}>
          <Findings circuit={circuit} trace={trace} answer={answer} started={readings.length > 0} />
          <div
            style={{
              border: `2px solid ${paint('ink')}`,
              padding: '8px 12px',
              marginTop: '14px',
              fontSize: '15px',
            }}
          >
            <b>Cautions</b> {circuit.cautions.map((caution) => cautionWords[caution].says).join(' ')}{' '}
            {meterRules}
          </div>
        </div>
        <div style={{ flex: 1 }}>
          <HandoutReadings
            rows={readings.map((reading, index) => ({
              number: readingNumber(index),
              reading,
              condition: conditionWords(circuit, reading.condition),
              told: answer?.readings.find((one) => one.id === readingNumber(index)) ?? null,
            }))}
            circuit={circuit}
          />
          {trace.proof && (
            <div style={{ marginTop: '10px', fontSize: '15px' }}>
              <b>Proof of the repair</b> {valueWords(trace.proof.reading.kind, trace.proof.reading.value)},{' '}
              {conditionWords(circuit, trace.proof.reading.condition)}.{' '}
              {trace.proof.works ? 'The circuit works.' : 'The circuit does not work yet.'}
            </div>
          )}
        </div>
      </div>
      <div
        style={{
          borderTop: rule,
          marginTop: '20px',
          paddingTop: '8px',
          display: 'flex',
          alignItems: 'center',
          gap: '10px',
          fontSize: '15px',
        }}
      >
        <Mark size={20} />
        <b>Halfsplit</b>
        <span>
          Circuit edition {trace.circuit.revision}. {makerFirst}
        </span>
      </div>
    </div>
  )
}

function Findings({
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
  const faulty = answer?.sites.filter((site) => site.verdict === 'faulty') ?? []
  const good = answer?.sites.filter((site) => site.verdict === 'proved-good') ?? []
  const firm = good.filter((site) => site.firm)
  const left = answer?.sites.filter((site) => site.verdict === 'in-question') ?? []
  const { finding } = trace
  return (
    <div style={{ fontSize: '15.5px' }}>
      <div style={{ fontSize: '23px', fontWeight: 800, lineHeight: 1.15 }}>
        {!started
          ? 'No reading yet'
          : faulty.length > 0
            ? faulty.map((site) => siteTitle(circuit, site.site)).join(', ')
            : answer?.outcome === 'no-fault'
              ? 'Nothing wrong in the conditions tried'
              : `${left.length} places in question`}
      </div>
      {started && answer && <div style={{ marginTop: '6px' }}>{answer.says}</div>}
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

const patterns: readonly [VerdictMark, string][] = [
  ['faulty', 'faulty'],
  ['in-question', 'in question'],
  ['proved-good', 'proved good'],
]

/** What the three patterns and the wire labels mean. */
function KeyStrip() {
  const { paint } = printInks
  return (
    <InksContext.Provider value={printInks}>
      <div
        style={{
          borderTop: `1.5px solid ${paint('ink')}`,
          borderBottom: `1.5px solid ${paint('ink')}`,
          padding: '8px 0',
          display: 'flex',
          alignItems: 'center',
          gap: '28px',
          fontSize: '15px',
        }}
      >
        {patterns.map(([verdict, words]) => (
          <span key={verdict} style={{ display: 'flex', alignItems: 'center', gap: '8px' }}>
            <svg width="92" height="30" viewBox="0 0 92 30" aria-hidden="true" focusable="false">
              <Primitives
                of={[
                  ...bandStrokes(5, verdict).map((stroke) => ({
                    kind: 'path' as const,
                    d: 'M0 15H58',
                    stroke: stroke.stroke,
                    strokeWidth: stroke.width,
                    dash: stroke.dash,
                  })),
                  { kind: 'path', d: 'M0 15H58', stroke: 'ink', strokeWidth: 5 },
                  ...verdictGlyph(verdict, { x: 76, y: 15 }),
                ]}
              />
            </svg>
            <b>{words}</b>
          </span>
        ))}
        <span style={{ marginLeft: 'auto' }}>
          Wire labels: insulation colour, base / stripe (IEC 60757), then mm²
        </span>
      </div>
    </InksContext.Provider>
  )
}

function dateWords(date: Date): string {
  return date.toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric' })
}
