import type { Place } from './primitive'

/** Radius of the turn between a level and an upright run. */
export const turnPixels = 7

/** A route as an SVG path with rounded turns. */
export function wirePath(route: readonly Place[], radius = turnPixels): string {
  const first = route[0]
  const last = route.at(-1)
  if (!first || !last) return ''
  let d = `M${first.x} ${first.y}`
  for (let at = 1; at < route.length - 1; at++) {
    const corner = route[at] as Place
    const before = route[at - 1] as Place
    const after = route[at + 1] as Place
    const turn = Math.min(radius, distance(before, corner) / 2, distance(corner, after) / 2)
    const enter = towards(corner, before, turn)
    const leave = towards(corner, after, turn)
    d += `L${enter.x} ${enter.y}Q${corner.x} ${corner.y} ${leave.x} ${leave.y}`
  }
  return `${d}L${last.x} ${last.y}`
}

export function distance(one: Place, other: Place): number {
  return Math.abs(one.x - other.x) + Math.abs(one.y - other.y)
}

/** The place `by` pixels from one place towards another, along a level or upright run. */
export function towards(from: Place, to: Place, by: number): Place {
  return { x: from.x + Math.sign(to.x - from.x) * by, y: from.y + Math.sign(to.y - from.y) * by }
}

/** The place a given length along a route, with the direction of its run. */
export function alongRoute(route: readonly Place[], length: number): { at: Place; run: number } | null {
  let left = length
  for (let run = 0; run + 1 < route.length; run++) {
    const from = route[run] as Place
    const to = route[run + 1] as Place
    const long = distance(from, to)
    if (left <= long || run + 2 === route.length) return { at: towards(from, to, Math.min(left, long)), run }
    left -= long
  }
  return null
}

export function routeLength(route: readonly Place[]): number {
  return route.slice(1).reduce((sum, place, at) => sum + distance(route[at] as Place, place), 0)
}
