'use client'

import type { DrawnWire } from '@/diagrams/drawing/drawn-wires'
import { type VerdictMark, wireStack, wireWidth } from '@/diagrams/drawing/wire-stroke'
import { useInks } from './inks'

/** A wire's stack of strokes: verdict band, gap in sheet colour, edge, insulation, stripe. */
export function WireDrawing({
  drawn,
  verdict,
  picked = false,
  least = 1,
}: {
  drawn: DrawnWire
  verdict: VerdictMark | null
  picked?: boolean
  /** Widens all strokes when the sheet is small, so that no wire gets thinner than 3 px. */
  least?: number
}) {
  const { paint } = useInks()
  const first = drawn.route[0]
  const last = drawn.route.at(-1)
  const width = wireWidth(drawn.wire.mm2)
  return (
    <g>
      {picked &&
        drawn.pieces.map((piece) => (
          <path
            key={`picked ${piece.startsAt}`}
            d={piece.d}
            style={{ fill: 'none', stroke: paint('line'), strokeWidth: width + 20 }}
          />
        ))}
      {wireStack(drawn.wire, verdict).map((stroke, index) =>
        drawn.pieces.map((piece) => (
          <path
            key={`${index} ${piece.startsAt}`}
            d={piece.d}
            style={{
              fill: 'none',
              stroke: paint(stroke.stroke),
              strokeWidth: stroke.width * least,
              strokeDasharray: stroke.dash,
              strokeDashoffset: stroke.dash ? piece.startsAt : undefined,
              strokeLinecap: stroke.cap,
              strokeLinejoin: 'round',
            }}
          />
        )),
      )}
      {picked &&
        [first, last].map(
          (end, at) =>
            end && (
              <rect
                key={at === 0 ? 'from' : 'to'}
                x={end.x - 7}
                y={end.y - 7}
                width={14}
                height={14}
                style={{ fill: paint('window'), stroke: paint('ink'), strokeWidth: 2.2 }}
              />
            ),
        )}
    </g>
  )
}

/** "BU/WH 0.75" on its plate of sheet colour. */
export function WireLabelDrawing({ drawn }: { drawn: DrawnWire }) {
  const { paint, text } = useInks()
  const label = drawn.label
  if (!label) return null
  return (
    <g>
      <rect
        x={label.plate.x}
        y={label.plate.y}
        width={label.plate.width}
        height={label.plate.height}
        style={{ fill: paint('sheet') }}
      />
      <text
        x={label.x}
        y={label.y}
        style={{ fill: paint('ink-2'), fontFamily: text, fontSize: '13px', fontWeight: 600 }}
      >
        {label.text}
      </text>
    </g>
  )
}
