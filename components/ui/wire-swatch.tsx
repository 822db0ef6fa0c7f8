import { wireStrokes } from '@/diagrams/drawing/wire-stroke'
import { readWireColour, wireColourName } from '@/diagrams/tables/wire-colours'

/** A piece of insulation, base and stripe; the letters beside it carry the colour. */
export function WireSwatch({
  colour,
  width = 54,
  height = 16,
  framed = false,
}: {
  colour: string
  width?: number
  height?: number
  /** On a picked row: keeps a frame in sheet colour. */
  framed?: boolean
}) {
  const read = readWireColour(colour)
  // The drawing's own strokes decide how wide a stripe is and where it is broken.
  const stripe = read?.stripe ? wireStrokes({ colour, mm2: 4 }).at(-1) : undefined
  const middle = height / 2
  return (
    <svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      aria-hidden="true"
      focusable="false"
      style={{
        flex: 'none',
        outline: framed ? '3px solid var(--sheet)' : undefined,
        background: 'var(--sheet)',
      }}
    >
      <rect
        x="0.75"
        y="0.75"
        width={width - 1.5}
        height={height - 1.5}
        fill={read?.base.ink ?? 'none'}
        style={{ stroke: 'var(--wire-edge)' }}
        strokeWidth="1.5"
        strokeDasharray={read ? undefined : '4 3'}
      />
      {stripe && (
        <line
          x1="1.5"
          y1={middle}
          x2={width - 1.5}
          y2={middle}
          stroke={stripe.stroke}
          strokeWidth={(stripe.width / 9) * (height - 2)}
          strokeDasharray="8 4"
        />
      )}
    </svg>
  )
}

/** Swatch with its letters, and the words for a screen reader. */
export function WireColour({ colour, framed }: { colour: string; framed?: boolean }) {
  return (
    <span className="inline-flex items-center gap-2.5 whitespace-nowrap">
      <WireSwatch colour={colour} framed={framed} />
      <span className="font-bold" aria-hidden="true">
        {colour || 'no colour'}
      </span>
      <span className="sr-only">{colour ? wireColourName(colour) : 'no colour given'}</span>
    </span>
  )
}
