'use client'

import { type Ref, useMemo } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import { conditionWords, valueWords } from '@/lib/client/meter/reading-words'
import { readingNumber } from '@/lib/client/evaluator/numbered-readings'
import type { Trace } from '@/lib/shared/api/traces'
import { printInks } from '../../canvas/inks'
import { StaticDrawing } from '../../canvas/static-drawing'
import { Mark } from '../../ui/wordmark'
import { cautionWords, makerFirst, meterRules } from '../caution-words'
import { traceOverlay } from '../trace-overlay'
import { HandoutFindings } from './handout-findings'
import { HandoutKey } from './handout-key'
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
      <HandoutKey />
      <div style={{ display: 'flex', gap: '36px', marginTop: '16px' }}>
        <div style={{ width: '38%' }}>
          <HandoutFindings circuit={circuit} trace={trace} answer={answer} started={readings.length > 0} />
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

function dateWords(date: Date): string {
  return date.toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric' })
}
