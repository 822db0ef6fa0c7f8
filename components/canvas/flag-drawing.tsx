'use client'

import type { Flag } from './flag-layout'
import { useInks } from './inks'

/** A plate with a pointer on what it is about: a reading, the next target, the volts of a point. */
export function FlagDrawing({ flag }: { flag: Flag }) {
  const { paint, text, figures } = useInks()
  const { box, tip, scale } = flag
  const inverted = flag.look === 'next'
  const ground = paint(inverted ? 'ink' : flag.look === 'volts' ? 'window' : 'panel')
  const words = paint(inverted ? 'on-ink' : 'ink')
  const stroke = {
    fill: ground,
    stroke: paint('ink'),
    strokeWidth: 1.8 * scale,
    strokeDasharray: flag.look === 'doubted' ? '5 4' : undefined,
  }
  const size = 14 * scale
  const baseline = box.y + box.height / 2 + size * 0.36
  const textStyle = {
    fill: words,
    fontSize: `${size}px`,
    fontWeight: 700,
    fontFamily: flag.look === 'next' ? text : figures,
    whiteSpace: 'pre' as const,
  }
  return (
    <g>
      {flag.look !== 'volts' && <path d={pointer(flag)} style={{ fill: paint('ink') }} />}
      {flag.look === 'volts' && far(flag) && (
        <line
          x1={tip.x}
          y1={tip.y}
          x2={box.x + box.width / 2}
          y2={box.y + box.height / 2}
          style={{ stroke: paint('ink'), strokeWidth: 1.2 * scale }}
        />
      )}
      <rect
        x={box.x}
        y={box.y}
        width={box.width}
        height={box.height}
        rx={flag.look === 'volts' ? box.height / 2 : 3 * scale}
        style={stroke}
      />
      {flag.number ? (
        <>
          <text x={box.x + 8 * scale} y={baseline} style={textStyle}>
            {flag.number}
          </text>
          <text x={box.x + box.width - 8 * scale} y={baseline} textAnchor="end" style={textStyle}>
            {flag.text}
          </text>
        </>
      ) : (
        <text x={box.x + box.width / 2} y={baseline} textAnchor="middle" style={textStyle}>
          {flag.text}
        </text>
      )}
    </g>
  )
}

/** A wedge from the plate's nearest edge to the tip. */
function pointer({ box, tip, scale }: Flag): string {
  const half = 6 * scale
  const x = Math.min(Math.max(tip.x, box.x + half + 3), box.x + box.width - half - 3)
  const y =
    tip.y < box.y ? box.y + 1 : tip.y > box.y + box.height ? box.y + box.height - 1 : box.y + box.height / 2
  return `M${x - half} ${y}L${tip.x} ${tip.y}L${x + half} ${y}Z`
}

function far({ box, tip, scale }: Flag): boolean {
  const dy = tip.y < box.y ? box.y - tip.y : tip.y - (box.y + box.height)
  return dy > 16 * scale
}
