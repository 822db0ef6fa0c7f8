'use client'

import { memo } from 'react'
import { type EdgeProps, useStore } from 'reactflow'
import { wireWidth } from '@/diagrams/drawing/wire-stroke'
import { useScene } from './scene-context'
import type { WireEdge as WireEdgeType } from './to-flow'
import { WireDrawing } from './wire-drawing'

const leastPixels = 3

/** A wire on the sheet. Its way comes from the drawing's own routes, not from where the ends happen to be. */
export const WireEdge = memo(function WireEdge({ id }: EdgeProps<WireEdgeType>) {
  const scene = useScene()
  // In tenths, so that a pinch does not redraw every wire at every step.
  const zoom = useStore((state) => Math.max(0.1, Math.floor(state.transform[2] * 10) / 10))
  const drawn = scene.wires.get(id)
  if (!drawn) return null
  const verdict = scene.overlay.verdicts?.get(`wire:${id}`) ?? null
  return (
    <WireDrawing
      drawn={drawn}
      verdict={verdict}
      picked={scene.picked === id}
      least={Math.max(1, leastPixels / (wireWidth(drawn.wire.mm2) * zoom))}
    />
  )
})
