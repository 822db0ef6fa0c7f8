import type { Place, Primitive } from './primitive'
import { alongRoute, distance, routeLength } from './wire-path'
import { wireWidth } from './wire-stroke'

/** Below this a wire counts as carrying nothing worth a chevron: a sense line, a leak. */
export const carriesFromAmps = 0.001

/** Chevrons along a wire, pointing the way current flows; none on a turn or where another wire crosses. */
export function currentChevrons(
  route: readonly Place[],
  mm2: number,
  amps: number,
  crossings: readonly Place[] = [],
): Primitive[] {
  const long = routeLength(route)
  if (Math.abs(amps) < carriesFromAmps || long < 30) return []
  const count = Math.max(1, Math.min(3, Math.floor(long / 220)))
  const reach = wireWidth(mm2) / 2 + 5
  return Array.from({ length: count }, (_, at) =>
    clearSpot(route, (long * (at + 1)) / (count + 1), crossings),
  ).flatMap((spot): Primitive[] => (spot ? chevron(spot, route, reach, Math.sign(amps)) : []))
}

/** The clear place on a route nearest to a wanted length. */
function clearSpot(route: readonly Place[], wanted: number, crossings: readonly Place[]) {
  for (const step of [0, 8, -8, 16, -16, 24, -24, 36, -36, 48, -48]) {
    const spot = alongRoute(route, Math.max(0, wanted + step))
    if (!spot) return null
    const from = route[spot.run] as Place
    const to = route[spot.run + 1] as Place
    const ends = Math.min(distance(from, spot.at), distance(spot.at, to))
    if (ends >= 14 && crossings.every((place) => distance(place, spot.at) > 22)) return spot
  }
  return alongRoute(route, wanted)
}

function chevron(
  spot: { at: Place; run: number },
  route: readonly Place[],
  reach: number,
  way: number,
): Primitive[] {
  const from = route[spot.run] as Place
  const to = route[spot.run + 1] as Place
  const { x, y } = spot.at
  const alongX = Math.sign(to.x - from.x) * way
  const alongY = Math.sign(to.y - from.y) * way
  const wing = (side: number) =>
    `${x - alongX * 4 + alongY * reach * side} ${y - alongY * 4 + alongX * reach * side}`
  const d = `M${wing(1)}L${x + alongX * 5} ${y + alongY * 5}L${wing(-1)}`
  return [
    { kind: 'path', d, fill: 'none', stroke: 'sheet', strokeWidth: 7, cap: 'round' },
    { kind: 'path', d, fill: 'none', stroke: 'ink', strokeWidth: 3, cap: 'round' },
  ]
}
