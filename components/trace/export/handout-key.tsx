'use client'

import { verdictGlyph } from '@/diagrams/drawing/verdict-mark'
import { bandStrokes, type VerdictMark } from '@/diagrams/drawing/wire-stroke'
import { InksContext, printInks } from '../../canvas/inks'
import { Primitives } from '../../canvas/primitives'

const patterns: readonly [VerdictMark, string][] = [
  ['faulty', 'faulty'],
  ['in-question', 'in question'],
  ['proved-good', 'proved good'],
]

/** What the three patterns and the wire labels mean. */
export function HandoutKey() {
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
