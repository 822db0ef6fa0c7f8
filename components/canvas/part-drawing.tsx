'use client'

import type { Node } from '@/diagrams/document/node-schema'
import { partLabels } from '@/diagrams/drawing/part-label'
import { partSymbol } from '@/diagrams/drawing/part-symbol'
import { ringStrokes } from '@/diagrams/drawing/verdict-mark'
import { Primitives } from './primitives'
import type { Scene } from './scene'

/** Parts whose first primitive is a filled body that would hide a ring drawn under it. */
const bodied = new Set<Node['kind']>(['switch', 'relay', 'module', 'dlc'])

/** A part with its names and its rings, in its own coordinates. */
export function PartDrawing({ scene, node }: { scene: Scene; node: Node }) {
  const state = scene.states.get(node.id)
  const symbol = partSymbol(node, state)
  const rings = scene.marks.filter((mark) => mark.node === node.id)
  const body = bodied.has(node.kind) ? 1 : 0
  const draw = (over: boolean) =>
    rings.filter((mark) => mark.overBody === over).flatMap((mark) => ringStrokes(mark, mark.verdict))
  return (
    <g>
      {/* Rings are given in the sheet's coordinates. */}
      <g transform={`translate(${-node.x} ${-node.y})`}>
        <Primitives of={draw(false)} />
      </g>
      <Primitives of={symbol.slice(0, body)} />
      <g transform={`translate(${-node.x} ${-node.y})`}>
        <Primitives of={draw(true)} />
      </g>
      <Primitives of={symbol.slice(body)} />
      <Primitives of={partLabels(scene.circuit, node, state)} />
    </g>
  )
}
