import type { Circuit } from '@/diagrams/document/circuit-schema'
import { parsePoint, pointsOf } from '@/diagrams/document/points'
import { portsOf, wiresByEnd } from '@/diagrams/document/ports'
import { endPlace, nodesById } from '@/diagrams/drawing/part-geometry'
import type { Place } from '@/diagrams/drawing/primitive'

export interface PointPlace extends Place {
  point: string
}

/** Half a finger: how far the two sides of an open contact are moved apart, so that each can be tapped. */
const apartPixels = 22

/**
 * Every point a lead can reach in this condition, where it is tapped on the sheet. Both sides of a contact lie on one
 * spot of the drawing: with its connector open, the harness side is tapped outside the part and the part's side inside.
 */
export function pointPlaces(circuit: Circuit, unplugged: readonly string[]): PointPlace[] {
  const open = new Set(unplugged)
  const wired = wiresByEnd(circuit)
  const nodes = nodesById(circuit.nodes)
  return pointsOf(circuit).flatMap((point): PointPlace[] => {
    const parsed = parsePoint(point)
    if (!parsed) return []
    const end = `${parsed.node}.${parsed.port}`
    const node = nodes.get(parsed.node)
    const port = node && portsOf(node).find((one) => one.name === parsed.port)
    const isOpen = port?.connector !== null && port?.connector !== undefined && open.has(port.connector)
    // The part's side is out of reach while plugged in; an unused terminal of a relay is not drawn.
    if (!node || !port || (parsed.part && !isOpen)) return []
    if (!wired.has(end) && node.kind !== 'dlc') return []
    const place = endPlace(nodes, end)
    if (!place) return []
    const [outX, outY] = outwards(place.side)
    const by = isOpen && node.kind !== 'cavity' ? (parsed.part ? -apartPixels : apartPixels) : 0
    return [{ point, x: place.x + outX * by, y: place.y + outY * by }]
  })
}

function outwards(side: string): [number, number] {
  switch (side) {
    case 'left':
      return [-1, 0]
    case 'right':
      return [1, 0]
    case 'top':
      return [0, -1]
    case 'bottom':
      return [0, 1]
    default:
      return [0, 0]
  }
}
