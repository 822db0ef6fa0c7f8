import type { Circuit, Wire } from '../document/circuit-schema'
import { connectorOutlines } from './connector-outline'
import { crossings, visiblePieces, type Piece } from './crossings'
import { partBox } from './part-geometry'
import { partLabels, textBox } from './part-label'
import { partState, type Moment } from './part-state'
import { grow, type Box, type Place } from './primitive'
import { wireLabels, type WireLabel } from './wire-label'
import { wirePath } from './wire-path'
import { wireRoute } from './wire-route'
import { bandStrokes, stackWidth, wireWidth, type VerdictMark } from './wire-stroke'

export interface DrawnWire {
  wire: Wire
  route: Place[]
  /** What shows: the route less the gaps where it passes under another wire. Stroke each piece with `wireStack`. */
  pieces: (Piece & { d: string })[]
  label: WireLabel | null
  /** Where it meets others, over or under. */
  crossings: Place[]
}

/** Every wire of a circuit ready to be stroked: where it runs, where it dives under another, where its label goes. */
export function drawWires(
  circuit: Circuit,
  verdicts: ReadonlyMap<string, VerdictMark> = new Map(),
  moreObstacles: readonly Box[] = [],
): Map<string, DrawnWire> {
  const routed = circuit.wires.map((wire) => ({
    id: wire.id,
    route: wireRoute(circuit, wire),
    gapPixels: stackWidth(wire.mm2, verdicts.get(`wire:${wire.id}`) ?? null),
  }))
  const crossed = crossings(routed)
  const labels = new Map(
    wireLabels(
      circuit.wires.map((wire, at) => ({
        wire,
        route: routed[at]?.route ?? [],
        reachPixels: reach(wire, verdicts),
      })),
      [...labelObstacles(circuit), ...moreObstacles],
    ).map((label) => [label.wire, label]),
  )
  return new Map(
    circuit.wires.map((wire, at) => {
      const own = routed[at] as (typeof routed)[number]
      const pieces = visiblePieces(own, crossed).map((piece) => ({ ...piece, d: wirePath(piece.points) }))
      return [
        wire.id,
        {
          wire,
          route: own.route,
          pieces,
          label: labels.get(wire.id) ?? null,
          crossings: crossed
            .filter((one) => one.over === wire.id || one.under === wire.id)
            .map((one) => one.at),
        },
      ]
    }),
  )
}

/** Half of what a wire covers across: itself with a little air, or its band. */
function reach(wire: Wire, verdicts: ReadonlyMap<string, VerdictMark>): number {
  const width = wireWidth(wire.mm2)
  const bands = bandStrokes(width, verdicts.get(`wire:${wire.id}`) ?? null).map((stroke) => stroke.width)
  return Math.max(width + 4, ...bands) / 2
}

const restMoment: Moment = { positions: {}, unplugged: [] }

/** What a wire's label must keep clear of: parts, their names, connector outlines and their names. */
export function labelObstacles(circuit: Circuit): Box[] {
  const parts = circuit.nodes.flatMap((node): Box[] => {
    const { width, height } = partBox(node)
    const inset = node.kind === 'splice' ? -10 : node.connector ? 9 : 2
    const labels = partLabels(circuit, node, partState(circuit, node, restMoment)).map((text) => {
      const box = textBox(text)
      return grow({ ...box, x: box.x + node.x, y: box.y + node.y }, 2)
    })
    return [grow({ x: node.x, y: node.y, width, height }, inset), ...labels]
  })
  const outlines = connectorOutlines(circuit).flatMap(({ box, primitives }): Box[] => [
    // The two upright dashed edges: a label across one is hard to read.
    { x: box.x - 2, y: box.y, width: 4, height: box.height },
    { x: box.x + box.width - 2, y: box.y, width: 4, height: box.height },
    ...primitives.flatMap((one) => (one.kind === 'text' ? [grow(textBox(one), 2)] : [])),
  ])
  return [...parts, ...outlines]
}
