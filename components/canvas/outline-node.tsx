'use client'

import { memo } from 'react'
import type { NodeProps } from 'reactflow'
import { connectorOutlines } from '@/diagrams/drawing/connector-outline'
import { Primitives } from './primitives'
import { useScene } from './scene-context'
import type { OutlineNode as OutlineNodeType } from './to-flow'

/** The dashed outline round the cavities of one connector. */
export const OutlineNode = memo(function OutlineNode({ data }: NodeProps<OutlineNodeType>) {
  const { circuit } = useScene()
  const outline = connectorOutlines(circuit).find(({ connector }) => connector.id === data.id)
  if (!outline) return null
  return (
    <svg
      width={outline.box.width}
      height={outline.box.height}
      aria-hidden="true"
      focusable="false"
      style={{ overflow: 'visible', pointerEvents: 'none' }}
    >
      <g transform={`translate(${-outline.box.x} ${-outline.box.y})`}>
        <Primitives of={outline.primitives} />
      </g>
    </svg>
  )
})
