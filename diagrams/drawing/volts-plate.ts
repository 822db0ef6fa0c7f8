import type { Circuit } from '../document/circuit-schema'
import { parsePoint } from '../document/points'
import { endPlace, nodesById } from './part-geometry'
import { boxesMeet, grow, textWidth, type Box, type Primitive } from './primitive'

export interface VoltsPlate {
  point: string
  box: Box
  primitives: Primitive[]
}

const plateHeight = 24

/**
 * The voltage of points in round-ended plates under or over their ports. A plate is left out where there is no free
 * spot or where the same joint already carries one: the list beside the drawing has every point.
 */
export function voltsPlates(
  circuit: Circuit,
  volts: ReadonlyMap<string, number>,
  taken: readonly Box[],
): VoltsPlate[] {
  const nodes = nodesById(circuit.nodes)
  const placed: VoltsPlate[] = []
  for (const [point, value] of volts) {
    const parsed = parsePoint(point)
    const node = parsed ? nodes.get(parsed.node) : undefined
    if (!parsed || !node || parsed.part) continue
    const port = endPlace(nodes, `${parsed.node}.${parsed.port}`)
    if (!port) continue
    const text = value.toFixed(1)
    const width = textWidth(text, 13.5, true) + 20
    const away = port.side === 'left' ? -width / 2 - 8 : port.side === 'right' ? width / 2 + 8 : 0
    const spots = [15, -15 - plateHeight, 38, -38 - plateHeight].flatMap((down) =>
      [away, away * 1.6, 0].map((aside) => ({
        x: port.x + aside - width / 2,
        y: port.y + down,
        width,
        height: plateHeight,
      })),
    )
    const free = spots.find(
      (box) =>
        !taken.some((other) => boxesMeet(box, other)) &&
        !placed.some((other) => boxesMeet(grow(box, 3), other.box)),
    )
    if (!free) continue
    placed.push({
      point,
      box: free,
      primitives: [
        { kind: 'rect', ...free, radius: plateHeight / 2, fill: 'window', stroke: 'ink', strokeWidth: 1.6 },
        {
          kind: 'text',
          x: free.x + width / 2,
          y: free.y + 17,
          text,
          size: 13.5,
          weight: 700,
          anchor: 'middle',
          fill: 'ink',
          mono: true,
        },
      ],
    })
  }
  return placed
}
