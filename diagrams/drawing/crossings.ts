import type { Place } from './primitive'
import { alongRoute, distance, routeLength } from './wire-path'

export interface RoutedWire {
  id: string
  route: Place[]
  /** How wide a gap this wire needs where another passes under it. */
  gapPixels: number
}

export interface Crossing {
  /** The wire with the level run: drawn whole. */
  over: string
  /** The wire with the upright run: interrupted. */
  under: string
  at: Place
  /** Length from the start of the wire under to the crossing. */
  along: number
  gapPixels: number
}

/** Every place where an upright run of one wire meets a level run of another without joining it. */
export function crossings(wires: readonly RoutedWire[]): Crossing[] {
  const found: Crossing[] = []
  for (const under of wires) {
    let walked = 0
    for (let run = 0; run + 1 < under.route.length; run++) {
      const from = under.route[run] as Place
      const to = under.route[run + 1] as Place
      if (from.x === to.x)
        for (const over of wires) {
          if (over.id === under.id) continue
          for (const y of levelRunsOver(over.route, from, to))
            found.push({
              over: over.id,
              under: under.id,
              at: { x: from.x, y },
              along: walked + Math.abs(y - from.y),
              gapPixels: over.gapPixels,
            })
        }
      walked += distance(from, to)
    }
  }
  return found
}

/** Heights at which a route's level runs pass the inside of an upright run. */
function levelRunsOver(route: readonly Place[], from: Place, to: Place): number[] {
  const heights: number[] = []
  for (let run = 0; run + 1 < route.length; run++) {
    const a = route[run] as Place
    const b = route[run + 1] as Place
    if (a.y !== b.y) continue
    const inside = Math.min(a.x, b.x) < from.x && from.x < Math.max(a.x, b.x)
    if (inside && Math.min(from.y, to.y) < a.y && a.y < Math.max(from.y, to.y)) heights.push(a.y)
  }
  return heights
}

export interface Piece {
  points: Place[]
  /** Length from the wire's start, so that stripes and rungs run on as if nothing lay between. */
  startsAt: number
}

/** A wire's route with the gaps cut out where it passes under others: what is really drawn. */
export function visiblePieces(wire: RoutedWire, all: readonly Crossing[]): Piece[] {
  const total = routeLength(wire.route)
  const cuts = all
    .filter((crossing) => crossing.under === wire.id)
    .map(({ along, gapPixels }) => ({ from: along - gapPixels / 2, to: along + gapPixels / 2 }))
    .toSorted((one, other) => one.from - other.from)
  const pieces: Piece[] = []
  let start = 0
  for (const cut of [...cuts, { from: total, to: total }]) {
    if (cut.from > start) pieces.push({ points: section(wire.route, start, cut.from), startsAt: start })
    start = Math.max(start, cut.to)
  }
  return pieces
}

function section(route: readonly Place[], from: number, to: number): Place[] {
  const first = alongRoute(route, from)
  const last = alongRoute(route, to)
  if (!first || !last) return []
  const points = [first.at, ...route.slice(first.run + 1, last.run + 1), last.at]
  return points.filter((place, at) => at === 0 || distance(place, points[at - 1] as Place) > 0)
}
