import type { Wire } from '../document/circuit-schema'
import { boxesMeet, grow, textWidth, type Box, type Place } from './primitive'
import { distance } from './wire-path'

export interface WireLabel {
  wire: string
  text: string
  /** The plate in sheet colour behind the words. */
  plate: Box
  /** Baseline start of the words. */
  x: number
  y: number
}

export const wireLabelSize = 13

/** "BU/WH 0.75": colour and size, as the drawing writes it. */
export function wireLabelText(wire: Pick<Wire, 'colour' | 'mm2'>): string {
  return [wire.colour.toUpperCase(), String(wire.mm2)].filter(Boolean).join(' ')
}

/**
 * A place for each wire's label: above its longest level run or right of an upright one, at the middle; below, left
 * or further along when something stands there. Wires with the least choice, the short ones, choose first.
 */
export function wireLabels(
  wires: readonly { wire: Wire; route: readonly Place[]; reachPixels: number }[],
  obstacles: readonly Box[],
): WireLabel[] {
  const runs = wires.flatMap(({ route, reachPixels }) =>
    route.slice(1).map((to, at) => runBox(route[at] as Place, to, reachPixels)),
  )
  const taken: Box[] = []
  const labels = new Map<string, WireLabel>()
  const longest = (route: readonly Place[]) =>
    Math.max(0, ...route.slice(1).map((to, at) => distance(route[at] as Place, to)))
  const order = wires.toSorted((one, other) => longest(one.route) - longest(other.route))
  for (const { wire, route, reachPixels } of order) {
    if (route.length < 2) continue
    const text = wireLabelText(wire)
    const size = { width: textWidth(text, wireLabelSize) + 6, height: 17 }
    // Only what stands near this wire can be in its label's way.
    const around = grow(boundsOf(route), size.width + 20)
    const near = (boxes: readonly Box[]) => boxes.filter((box) => boxesMeet(box, around))
    const [nearObstacles, nearTaken, nearRuns] = [near(obstacles), near(taken), near(runs)]
    let best: { plate: Box; cost: number } | null = null
    for (const [rank, plate] of candidates(route, reachPixels, size).entries()) {
      const cost =
        rank * 0.01 +
        nearObstacles.reduce((sum, box) => sum + overlap(plate, box), 0) +
        nearTaken.reduce((sum, box) => sum + 2 * overlap(plate, box), 0) +
        nearRuns.reduce((sum, box) => sum + overlap(plate, box), 0)
      if (best === null || cost < best.cost) best = { plate, cost }
      if (cost < 1 && cost === rank * 0.01) break
    }
    if (!best) continue
    taken.push(best.plate)
    labels.set(wire.id, {
      wire: wire.id,
      text,
      plate: best.plate,
      x: best.plate.x + 3,
      y: best.plate.y + 13,
    })
  }
  return wires.flatMap(({ wire }) => labels.get(wire.id) ?? [])
}

/** Plates beside a route, best first. */
function candidates(
  route: readonly Place[],
  reachPixels: number,
  size: { width: number; height: number },
): Box[] {
  const runs = route
    .slice(1)
    .map((to, at) => ({ from: route[at] as Place, to, long: distance(route[at] as Place, to) }))
    .toSorted((one, other) => other.long - one.long)
  const off = reachPixels + 3
  const shifts = [0, -0.12, 0.12, -0.24, 0.24, -0.34, 0.34, -0.42, 0.42]
  return runs.flatMap(({ from, to, long }) => {
    const level = from.y === to.y
    const middleX = (from.x + to.x) / 2
    const middleY = (from.y + to.y) / 2
    // The whole run's own side before the other one: a label between two parallel wires could mean either.
    return [-1, 1].flatMap((side) =>
      shifts.map((shift) =>
        level
          ? {
              x: middleX + shift * long - size.width / 2,
              y: side < 0 ? middleY - off - size.height : middleY + off,
              ...size,
            }
          : {
              x: side < 0 ? middleX + off : middleX - off - size.width,
              y: middleY + shift * long - size.height / 2,
              ...size,
            },
      ),
    )
  })
}

function runBox(from: Place, to: Place, half: number): Box {
  return {
    x: Math.min(from.x, to.x) - half,
    y: Math.min(from.y, to.y) - half,
    width: Math.abs(from.x - to.x) + 2 * half,
    height: Math.abs(from.y - to.y) + 2 * half,
  }
}

function boundsOf(route: readonly Place[]): Box {
  const [xs, ys] = [route.map((place) => place.x), route.map((place) => place.y)]
  const [x, y] = [Math.min(...xs), Math.min(...ys)]
  return { x, y, width: Math.max(...xs) - x, height: Math.max(...ys) - y }
}

/** Shared area of two boxes, square pixels. */
function overlap(one: Box, other: Box): number {
  if (!boxesMeet(one, other)) return 0
  const width = Math.min(one.x + one.width, other.x + other.width) - Math.max(one.x, other.x)
  const height = Math.min(one.y + one.height, other.y + other.height) - Math.max(one.y, other.y)
  return width * height
}
