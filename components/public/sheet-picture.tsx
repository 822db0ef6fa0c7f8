import type { Circuit } from '@/diagrams/document/circuit-schema'
import { circuitPrimitives } from '@/diagrams/drawing/draw-circuit'
import { drawingBounds } from '@/diagrams/drawing/drawing-bounds'
import type { Overlay } from '@/diagrams/drawing/overlay'
import type { Token } from '@/diagrams/drawing/primitive'
import { primitivesToSvg } from '@/diagrams/drawing/svg-text'
import { lightInks } from '@/diagrams/drawing/theme-inks'

// Tokens instead of inks: the picture follows light and dark without being drawn anew.
const tokenInks = Object.fromEntries(
  Object.keys(lightInks).map((token) => [token, `var(--${token})`]),
) as Record<Token, string>

const marginPixels = 16

/** A circuit as a picture that nobody operates, drawn on the server by the sheet's own rules. */
export function SheetPicture({
  circuit,
  overlay,
  label,
}: {
  circuit: Circuit
  overlay: Overlay
  label: string
}) {
  const primitives = circuitPrimitives(circuit, overlay)
  const box = drawingBounds(primitives)
  const view = [
    box.x - marginPixels,
    box.y - marginPixels,
    box.width + 2 * marginPixels,
    box.height + 2 * marginPixels,
  ]
  return (
    <svg
      viewBox={view.join(' ')}
      role="img"
      aria-label={label}
      className="sheet-picture block h-auto w-full"
      style={{ minWidth: `${Math.min(view[2] ?? 0, 900)}px`, maxWidth: `${(view[2] ?? 0) * 1.2}px` }}
      // Own markup: every text of the document is escaped by the drawing.
      dangerouslySetInnerHTML={{ __html: primitivesToSvg(primitives, tokenInks) }}
    />
  )
}
