'use client'

import type { Primitive } from '@/diagrams/drawing/primitive'
import { type Inks, useInks } from './inks'

/** Drawing primitives as SVG, painted by inline styles so that a picture of the sheet keeps them. */
export function Primitives({ of }: { of: readonly Primitive[] }) {
  const inks = useInks()
  return of.map((one, index) => <PrimitiveShape key={`${one.kind} ${index}`} of={one} inks={inks} />)
}

function PrimitiveShape({ of: one, inks }: { of: Primitive; inks: Inks }) {
  if (one.kind === 'text')
    return (
      <text
        x={one.x}
        y={one.y}
        textAnchor={one.anchor}
        style={{
          fill: inks.paint(one.fill),
          fontFamily: one.mono ? inks.figures : inks.text,
          fontSize: `${one.size}px`,
          fontWeight: one.weight,
        }}
      >
        {one.text}
      </text>
    )
  const style = {
    fill: inks.paint(one.fill ?? 'none'),
    stroke: one.stroke ? inks.paint(one.stroke) : 'none',
    strokeWidth: one.strokeWidth,
    strokeDasharray: one.dash,
    strokeDashoffset: one.dashOffset,
    strokeLinecap: one.cap,
    strokeLinejoin: 'round' as const,
  }
  switch (one.kind) {
    case 'path':
      return <path d={one.d} style={style} />
    case 'circle':
      return <circle cx={one.cx} cy={one.cy} r={one.r} style={style} />
    case 'rect':
      return <rect x={one.x} y={one.y} width={one.width} height={one.height} rx={one.radius} style={style} />
    case 'line':
      return <line x1={one.x1} y1={one.y1} x2={one.x2} y2={one.y2} style={style} />
  }
}
