import type { Place, Primitive } from '@/diagrams/drawing/primitive'
import { alongRoute, distance, routeLength } from '@/diagrams/drawing/wire-path'

const everyPixels = 150
/** Below this a wire is drawn as carrying nothing; a voltmeter's own current is a millionth of an ampere. */
export const carryingAmps = 0.0001

/** Open angles on a wire that carries current, in its direction; they stand still. */
export function chevrons(route: readonly Place[], amps: number): Primitive[] {
  if (Math.abs(amps) < carryingAmps) return []
  const way = amps > 0 ? route : route.toReversed()
  const total = routeLength(way)
  const count = Math.max(1, Math.round(total / everyPixels))
  return Array.from({ length: count }, (_, at) => ((at + 0.5) * total) / count).flatMap((length) => {
    const found = alongRoute(way, clearOfTurns(way, length))
    if (!found) return []
    const from = way[found.run] as Place
    const to = way[found.run + 1] as Place
    const [dx, dy] = [Math.sign(to.x - from.x), Math.sign(to.y - from.y)]
    const { x, y } = found.at
    const d =
      `M${x - dx * 5 - dy * 8} ${y - dy * 5 - dx * 8}L${x + dx * 4} ${y + dy * 4}` +
      `L${x - dx * 5 + dy * 8} ${y - dy * 5 + dx * 8}`
    return [
      { kind: 'path', d, stroke: 'sheet', strokeWidth: 7.5, cap: 'round', fill: 'none' },
      { kind: 'path', d, stroke: 'ink', strokeWidth: 3, cap: 'round', fill: 'none' },
    ] satisfies Primitive[]
  })
}

/** Moves a place off a turn of the route, into the middle of its run when the run is short. */
function clearOfTurns(route: readonly Place[], length: number): number {
  let walked = 0
  for (let run = 0; run + 1 < route.length; run++) {
    const long = distance(route[run] as Place, route[run + 1] as Place)
    if (length <= walked + long || run + 2 === route.length) {
      const margin = Math.min(16, long / 2)
      return Math.min(Math.max(length, walked + margin), walked + long - margin)
    }
    walked += long
  }
  return length
}
