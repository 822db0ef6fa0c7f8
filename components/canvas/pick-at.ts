import { partBox } from '@/diagrams/drawing/part-geometry'
import type { Place } from '@/diagrams/drawing/primitive'
import type { PointPlace } from './point-place'
import type { Scene } from './scene'

export type Picked = { point: string } | { wire: string } | { node: string; site: string | null }

/**
 * What a finger on the sheet means: the nearest point within reach, else the wire under it, else the part. Two points
 * closer together than a finger are still told apart, because the nearer one wins.
 */
export function pickAt(
  scene: Scene,
  points: readonly PointPlace[],
  at: Place,
  reachPixels: number,
): Picked | null {
  let nearest: PointPlace | null = null
  let far = reachPixels
  for (const point of points) {
    const distance = Math.hypot(point.x - at.x, point.y - at.y)
    if (distance <= far) {
      far = distance
      nearest = point
    }
  }
  if (nearest) return { point: nearest.point }
  const mark = scene.marks.find(({ glyph }) => Math.hypot(glyph.x - at.x, glyph.y - at.y) <= reachPixels)
  if (mark?.node) return { node: mark.node, site: mark.site }
  const part = scene.circuit.nodes.find((node) => {
    const { width, height } = partBox(node)
    return at.x >= node.x && at.x <= node.x + width && at.y >= node.y && at.y <= node.y + height
  })
  const wire = nearestWire(scene, at, reachPixels)
  if (part && part.kind !== 'splice') return { node: part.id, site: siteAt(scene, part.id, at) }
  if (wire) return { wire }
  return part ? { node: part.id, site: siteAt(scene, part.id, at) } : null
}

function nearestWire(scene: Scene, at: Place, reachPixels: number): string | null {
  let found: string | null = null
  let far = reachPixels
  for (const [id, { route }] of scene.wires)
    for (let run = 0; run + 1 < route.length; run++) {
      const distance = distanceToRun(at, route[run] as Place, route[run + 1] as Place)
      if (distance <= far) {
        far = distance
        found = id
      }
    }
  return found
}

/** The marked place of a part that lies under the finger, the smallest if several do. */
function siteAt(scene: Scene, node: string, at: Place): string | null {
  const under = scene.marks
    .filter(
      ({ ring, node: of }) =>
        of === node &&
        ring &&
        at.x >= ring.x - 6 &&
        at.x <= ring.x + ring.width + 6 &&
        at.y >= ring.y - 6 &&
        at.y <= ring.y + ring.height + 6,
    )
    .toSorted((one, other) => area(one) - area(other))
  return under[0]?.site ?? null
}

function area({ ring }: { ring: { width: number; height: number } | null }): number {
  return ring ? ring.width * ring.height : Number.POSITIVE_INFINITY
}

function distanceToRun(at: Place, from: Place, to: Place): number {
  const x = Math.min(Math.max(at.x, Math.min(from.x, to.x)), Math.max(from.x, to.x))
  const y = Math.min(Math.max(at.y, Math.min(from.y, to.y)), Math.max(from.y, to.y))
  return Math.hypot(at.x - x, at.y - y)
}
