import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { DrawnWire } from '@/diagrams/drawing/drawn-wires'
import type { Place, Primitive } from '@/diagrams/drawing/primitive'
import { alongRoute, routeLength } from '@/diagrams/drawing/wire-path'

/** A wire found to touch what it should not. */
export interface ShortFound {
  wire: string
  to: 'ground' | 'supply' | { wire: string }
}

export interface ShortTail {
  wire: string
  primitives: Primitive[]
}

const tailPixels = 58

/** A heavy dashed tail from the wire's middle to a ground, a feed or the other wire, with a word beside it. */
export function shortTails(
  circuit: Circuit,
  shorts: readonly ShortFound[],
  wires: ReadonlyMap<string, DrawnWire>,
): ShortTail[] {
  return shorts.flatMap(({ wire, to }): ShortTail[] => {
    const start = middleOf(wires.get(wire))
    if (!start) return []
    if (typeof to === 'object') {
      const end = middleOf(wires.get(to.wire))
      if (!end) return []
      const other = circuit.wires.find((one) => one.id === to.wire)
      return [
        {
          wire,
          primitives: [
            dashes(start, end),
            ...word(
              { x: (start.x + end.x) / 2 + 8, y: (start.y + end.y) / 2 },
              `touches ${other?.colour || to.wire}`,
            ),
          ],
        },
      ]
    }
    const end = { x: start.x, y: start.y + (to === 'ground' ? tailPixels : -tailPixels) }
    return [
      {
        wire,
        primitives: [
          dashes(start, end),
          ...(to === 'ground' ? groundAt(end) : feedAt(end)),
          ...word(
            { x: end.x + 24, y: end.y + (to === 'ground' ? 8 : -6) },
            to === 'ground' ? 'to ground' : 'to supply',
          ),
        ],
      },
    ]
  })
}

function middleOf(drawn: DrawnWire | undefined): Place | null {
  return drawn ? (alongRoute(drawn.route, routeLength(drawn.route) / 2)?.at ?? null) : null
}

function dashes(from: Place, to: Place): Primitive {
  return {
    kind: 'line',
    x1: from.x,
    y1: from.y,
    x2: to.x,
    y2: to.y,
    stroke: 'ink',
    strokeWidth: 4,
    dash: '8 5',
  }
}

function groundAt({ x, y }: Place): Primitive[] {
  return [16, 10, 4].map((half, at) => ({
    kind: 'line',
    x1: x - half,
    y1: y + 6 * at,
    x2: x + half,
    y2: y + 6 * at,
    stroke: 'ink',
    strokeWidth: 3,
  }))
}

function feedAt({ x, y }: Place): Primitive[] {
  return [
    {
      kind: 'path',
      d: `M${x - 14} ${y - 24}H${x + 14}V${y - 10}L${x} ${y}L${x - 14} ${y - 10}Z`,
      fill: 'sheet',
      stroke: 'ink',
      strokeWidth: 2.4,
    },
  ]
}

function word({ x, y }: Place, text: string): Primitive[] {
  return [{ kind: 'text', x, y, text, size: 13.5, weight: 700, anchor: 'start', fill: 'ink' }]
}
