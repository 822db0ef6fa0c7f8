'use client'

import { useStore } from 'reactflow'
import { wirePath } from '@/diagrams/drawing/wire-path'
import { partBox } from '@/diagrams/drawing/part-geometry'
import type { Scene } from './scene'
import { wholeBounds } from './sheet-bounds'

const width = 164
const height = 60

/** The whole sheet in small, with a frame round what is in view. */
export function KeyMap({ scene }: { scene: Scene }) {
  const [x, y, zoom] = useStore((state) => state.transform)
  const sheetWidth = useStore((state) => state.width)
  const sheetHeight = useStore((state) => state.height)
  const whole = wholeBounds(scene)
  const scale = Math.max(whole.width / width, whole.height / height)
  return (
    <svg
      width={width}
      height={height}
      viewBox={`${whole.x} ${whole.y} ${whole.width} ${whole.height}`}
      aria-hidden="true"
      focusable="false"
    >
      {[...scene.wires.values()].map(({ wire, route }) => (
        <path
          key={wire.id}
          d={wirePath(route)}
          style={{ fill: 'none', stroke: 'var(--edge)', strokeWidth: 1.2 * scale }}
        />
      ))}
      {scene.circuit.nodes.map((node) => (
        <rect
          key={node.id}
          x={node.x}
          y={node.y}
          {...partBox(node)}
          style={{ fill: 'var(--window)', stroke: 'var(--edge)', strokeWidth: 1.2 * scale }}
        />
      ))}
      <rect
        x={-x / zoom}
        y={-y / zoom}
        width={sheetWidth / zoom}
        height={sheetHeight / zoom}
        style={{ fill: 'none', stroke: 'var(--ink)', strokeWidth: 2 * scale }}
      />
    </svg>
  )
}
