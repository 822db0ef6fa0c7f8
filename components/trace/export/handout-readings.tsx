'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { ReadingAnswer } from '@/diagrams/faults/answer'
import { measuredWords, movedWords, valueWords } from '@/lib/client/meter/reading-words'
import { printInks } from '../../canvas/inks'

export interface HandoutReading {
  number: string
  reading: Reading
  condition: string
  told: ReadingAnswer | null
}

/** The readings as a ruled table, with what the good circuit would show and what each one says. */
export function HandoutReadings({ circuit, rows }: { circuit: Circuit; rows: readonly HandoutReading[] }) {
  const { paint } = printInks
  const cell = { padding: '6px 10px 6px 0', verticalAlign: 'top' as const }
  const figure = {
    ...cell,
    fontFamily: printInks.figures,
    textAlign: 'right' as const,
    whiteSpace: 'nowrap' as const,
  }
  const head = {
    ...cell,
    textAlign: 'left' as const,
    borderBottom: `2px solid ${paint('ink')}`,
    fontWeight: 700,
  }
  return (
    <table style={{ width: '100%', borderCollapse: 'collapse', fontSize: '15px' }}>
      <thead>
        <tr>
          <th style={head}>No.</th>
          <th style={head}>Where and how</th>
          <th style={{ ...head, textAlign: 'right' }}>Read</th>
          <th style={{ ...head, textAlign: 'right', paddingRight: 0 }}>Good</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ number, reading, condition, told }) => (
          <tr key={number} style={{ borderBottom: `1px solid ${paint('line')}` }}>
            <td style={{ ...cell, fontWeight: 700 }}>{number}</td>
            <td style={cell}>
              <b>{measuredWords(circuit, reading)}</b>
              <div>{condition}</div>
              {told && <div style={{ color: paint('ink-2') }}>{told.says}</div>}
            </td>
            <td style={{ ...figure, fontWeight: 700, fontSize: '17px' }}>
              {valueWords(reading.kind, reading.value)}
              {reading.moved && (
                <div style={{ fontWeight: 400, fontSize: '13px' }}>{movedWords(reading)}</div>
              )}
            </td>
            <td style={{ ...figure, paddingRight: 0 }}>
              {told && told.expected !== null ? valueWords(reading.kind, told.expected) : ''}
            </td>
          </tr>
        ))}
        {rows.length === 0 && (
          <tr>
            <td style={cell} colSpan={4}>
              none yet
            </td>
          </tr>
        )}
      </tbody>
    </table>
  )
}
