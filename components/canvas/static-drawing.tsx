'use client'

import { useMemo } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { circuitPrimitives } from '@/diagrams/drawing/draw-circuit'
import { drawingBounds } from '@/diagrams/drawing/drawing-bounds'
import type { Overlay } from '@/diagrams/drawing/overlay'
import { grow } from '@/diagrams/drawing/primitive'
import { InksContext, printInks } from './inks'
import { Primitives } from './primitives'

/** The drawing with its marks and flags as one picture on white ground, for whatever leaves the screen. */
export function StaticDrawing({
  circuit,
  overlay,
  width,
  mostHeight,
}: {
  circuit: Circuit
  overlay: Overlay
  width: number
  mostHeight: number
}) {
  const primitives = useMemo(() => circuitPrimitives(circuit, overlay), [circuit, overlay])
  const bounds = grow(drawingBounds(primitives), 20)
  const scale = Math.min(width / bounds.width, mostHeight / bounds.height)
  return (
    <InksContext.Provider value={printInks}>
      <svg
        width={width}
        height={Math.round(bounds.height * scale)}
        viewBox={`${bounds.x} ${bounds.y} ${bounds.width} ${bounds.height}`}
        aria-hidden="true"
        focusable="false"
        style={{ display: 'block' }}
      >
        <Primitives of={primitives} />
      </svg>
    </InksContext.Provider>
  )
}
