'use client'

import type { Place } from '@/diagrams/drawing/primitive'
import { useInks } from './inks'

/** A meter's lead on the sheet: handle with its sign, tip down on the point. */
export function LeadDrawing({ lead, at, scale = 1 }: { lead: 'red' | 'black'; at: Place; scale?: number }) {
  const { paint } = useInks()
  return (
    <g transform={`translate(${at.x} ${at.y}) scale(${scale})`}>
      <path d="M0 -2v-10" style={{ stroke: paint('ink'), strokeWidth: 3, fill: 'none' }} />
      <rect
        x={-8}
        y={-30}
        width={16}
        height={19}
        rx={3}
        style={{
          fill: lead === 'red' ? 'var(--lead-red)' : 'var(--lead-black)',
          stroke: paint('ink'),
          strokeWidth: 1.8,
        }}
      />
      <path
        d={lead === 'red' ? 'M0 -25.5v10M-5 -20.5h10' : 'M-5 -20.5h10'}
        style={{ stroke: 'var(--lead-sign)', strokeWidth: 2.6, fill: 'none' }}
      />
    </g>
  )
}
