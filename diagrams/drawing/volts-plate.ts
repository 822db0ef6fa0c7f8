import type { Circuit } from '../document/circuit-schema'
import { parsePoint } from '../document/points'
import type { Node } from '../document/node-schema'
import { wiresByEnd } from '../document/ports'
import { endPlace, nodesById } from './part-geometry'
import { boxesMeet, grow, textWidth, type Box, type Primitive } from './primitive'

export interface VoltsPlate {
  point: string
  box: Box
  primitives: Primitive[]
}

const plateHeight = 24

/**
 * The voltage of points in round-ended plates under or over their ports. One plate serves both ends of a wire that
 * read alike, splices and grounds borrow those of their wires, and where there is no free spot none is drawn: the
 * list beside the drawing has every point.
 */
export function voltsPlates(
  circuit: Circuit,
  volts: ReadonlyMap<string, number>,
  taken: readonly Box[],
): VoltsPlate[] {
  const nodes = nodesById(circuit.nodes)
  const placed: VoltsPlate[] = []
  const shown = new Map<string, string>()
  const wiresAt = wiresByEnd(circuit)
  const farEnds = (end: string) =>
    (wiresAt.get(end) ?? []).flatMap((id) =>
      circuit.wires.filter((wire) => wire.id === id).map((wire) => (wire.from === end ? wire.to : wire.from)),
    )
  const order = [...volts].toSorted(([one], [other]) => rank(nodes, one) - rank(nodes, other))
  for (const [point, value] of order) {
    const parsed = parsePoint(point)
    const node = parsed ? nodes.get(parsed.node) : undefined
    if (!parsed || !node || parsed.part || !wiresAt.has(point)) continue
    if (node.kind === 'splice' || node.kind === 'ground') continue
    const port = endPlace(nodes, `${parsed.node}.${parsed.port}`)
    if (!port) continue
    // Rounding may leave a minus before nothing.
    const text = value.toFixed(1).replace(/^-0\.0$/, '0.0')
    if (farEnds(point).some((end) => shown.get(end) === text)) continue
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
    shown.set(point, text)
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

/** Where one looks first: at the parts that do something, then at connectors, then at feeds and fuses. */
function rank(nodes: ReadonlyMap<string, Node>, point: string): number {
  switch (nodes.get(point.slice(0, point.indexOf('.')))?.kind) {
    case 'load':
    case 'relay':
    case 'switch':
    case 'resistor':
      return 0
    case 'module':
    case 'dlc':
      return 1
    case 'cavity':
      return 2
    default:
      return 3
  }
}
