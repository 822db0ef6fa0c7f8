import { type Edge, type Node as FlowNode, Position } from 'reactflow'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { portsOf, splitEnd } from '@/diagrams/document/ports'
import { connectorOutlines } from '@/diagrams/drawing/connector-outline'
import { partBox, portPlace, type Side } from '@/diagrams/drawing/part-geometry'

export type PartNode = FlowNode<{ id: string }, 'part'>
export type OutlineNode = FlowNode<{ id: string }, 'outline'>
export type WireEdge = Edge<{ id: string }, 'wire'>

/** A circuit as nodes and edges of the sheet. They carry ids only: what they look like comes from the scene. */
export function toFlow(circuit: Circuit): { nodes: (PartNode | OutlineNode)[]; edges: WireEdge[] } {
  const fixed = { draggable: false, selectable: false, focusable: false, connectable: false }
  const outlines = connectorOutlines(circuit).map(
    ({ connector, box }): OutlineNode => ({
      ...fixed,
      id: `outline:${connector.id}`,
      type: 'outline',
      data: { id: connector.id },
      position: { x: box.x, y: box.y },
      width: box.width,
      height: box.height,
      zIndex: -1,
    }),
  )
  const parts = circuit.nodes.map((node): PartNode => {
    const { width, height } = partBox(node)
    return {
      ...fixed,
      id: node.id,
      type: 'part',
      data: { id: node.id },
      position: { x: node.x, y: node.y },
      width,
      height,
      handles: portsOf(node).map((port) => {
        const { x, y, side } = portPlace(node, port.name)
        return { id: port.name, type: 'source', position: flowSide(side), x, y, width: 1, height: 1 }
      }),
    }
  })
  const edges = circuit.wires.map((wire): WireEdge => {
    const from = splitEnd(wire.from)
    const to = splitEnd(wire.to)
    return {
      id: wire.id,
      type: 'wire',
      data: { id: wire.id },
      source: from.node,
      sourceHandle: from.port,
      target: to.node,
      targetHandle: to.port,
      selectable: false,
      focusable: false,
    }
  })
  return { nodes: [...outlines, ...parts], edges }
}

export function flowSide(side: Side): Position {
  switch (side) {
    case 'left':
      return Position.Left
    case 'top':
      return Position.Top
    case 'bottom':
      return Position.Bottom
    default:
      return Position.Right
  }
}
