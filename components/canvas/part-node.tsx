'use client'

import { memo } from 'react'
import { Handle, type NodeProps } from 'reactflow'
import { portsOf } from '@/diagrams/document/ports'
import { partBox, portPlace } from '@/diagrams/drawing/part-geometry'
import { PartDrawing } from './part-drawing'
import { useScene } from './scene-context'
import { flowSide, type PartNode as PartNodeType } from './to-flow'

/** A part on the sheet, with an unseen handle at each port for its wires. */
export const PartNode = memo(function PartNode({ id }: NodeProps<PartNodeType>) {
  const scene = useScene()
  const node = scene.nodes.get(id)
  if (!node) return null
  const { width, height } = partBox(node)
  return (
    <>
      <svg
        width={width}
        height={height}
        aria-hidden="true"
        focusable="false"
        style={{ position: 'absolute', overflow: 'visible', left: 0, top: 0 }}
      >
        <PartDrawing scene={scene} node={node} />
      </svg>
      {portsOf(node).map((port) => {
        const { x, y, side } = portPlace(node, port.name)
        return (
          <Handle
            key={port.name}
            id={port.name}
            type="source"
            position={flowSide(side)}
            isConnectable={false}
            style={{
              left: x,
              top: y,
              width: 1,
              height: 1,
              minWidth: 0,
              minHeight: 0,
              border: 0,
              opacity: 0,
              transform: 'none',
              pointerEvents: 'none',
            }}
          />
        )
      })}
    </>
  )
})
