import type { Place, Primitive } from './primitive'
import { alongRoute, distance, routeLength } from './wire-path'
import { wireWidth } from './wire-stroke'

/** Below this a wire counts as carrying nothing worth a chevron: a sense line, a leak. */
export const carriesFromAmps = 0.001

/** Chevrons along a wire, pointing the way current flows. */
export function currentChevrons(route: readonly Place[], mm2: number, amps: number): Primitive[] {
  const long = routeLength(route)
  if (Math.abs(amps) < carriesFromAmps || long < 30) return []
  const count = Math.max(1, Math.min(3, Math.floor(long / 220)))
  const reach = wireWidth(mm2) / 2 + 5
  return Array.from({ length: count }, (_, at) => alongRoute(route, (long * (at + 1)) / (count + 1))).flatMap(
    (spot): Primitive[] => {
      if (!spot) return []
      const from = route[spot.run] as Place
      const to = route[spot.run + 1] as Place
      // Near a turn the chevron slides back to the middle of its run.
      const near = Math.min(distance(from, spot.at), distance(spot.at, to)) < 12
      const { x, y } = near ? { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 } : spot.at
      const way = Math.sign(amps)
      const alongX = Math.sign(to.x - from.x) * way
      const alongY = Math.sign(to.y - from.y) * way
      const tip = { x: x + alongX * 5, y: y + alongY * 5 }
      const wing = (side: number) => ({
        x: x - alongX * 4 + alongY * reach * side,
        y: y - alongY * 4 + alongX * reach * side,
      })
      const [one, other] = [wing(1), wing(-1)]
      const d = `M${one.x} ${one.y}L${tip.x} ${tip.y}L${other.x} ${other.y}`
      return [
        { kind: 'path', d, fill: 'none', stroke: 'sheet', strokeWidth: 7, cap: 'round' },
        { kind: 'path', d, fill: 'none', stroke: 'ink', strokeWidth: 3, cap: 'round' },
      ]
    },
  )
}
