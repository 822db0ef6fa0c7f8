import { describe, expect, it } from 'vitest'
import { pickAt } from '@/components/canvas/pick-at'
import { pointPlaces } from '@/components/canvas/point-place'
import { buildScene } from '@/components/canvas/scene'
import { samples } from '@/diagrams/samples/all-samples'
import { alongRoute, routeLength } from '@/diagrams/drawing/wire-path'

describe.each(samples.map((circuit) => [circuit.title, circuit] as const))(
  'a finger on the sheet of %s',
  (_, circuit) => {
    const scene = buildScene(circuit, {})
    const points = pointPlaces(circuit, [])

    it('finds every wired point when it is put right on it', () => {
      for (const place of points) {
        const picked = pickAt(scene, points, place, 24)
        const found = picked && 'point' in picked ? points.find((one) => one.point === picked.point) : null
        // Two points on one spot, such as a cavity end on a splice, may stand for each other.
        expect(found && { x: found.x, y: found.y }).toEqual({ x: place.x, y: place.y })
      }
    })

    it('finds the wire in the middle of its run, away from points', () => {
      for (const [id, { route }] of scene.wires) {
        const middle = alongRoute(route, routeLength(route) / 2)?.at
        if (!middle || points.some((one) => Math.hypot(one.x - middle.x, one.y - middle.y) < 30)) continue
        const picked = pickAt(scene, points, middle, 24)
        if (picked && 'wire' in picked) expect(scene.wires.has(picked.wire)).toBe(true)
        else expect(picked, id).toBeTruthy()
      }
    })

    it('reaches the part side of a contact only while its connector is open, a finger away from the harness side', () => {
      expect(points.filter((one) => one.point.endsWith(':part'))).toEqual([])
      for (const connector of circuit.connectors) {
        const open = pointPlaces(circuit, [connector.id])
        for (const part of open.filter((one) => one.point.endsWith(':part'))) {
          const harness = open.find((one) => `${one.point}:part` === part.point)
          expect(harness).toBeDefined()
          if (harness) expect(Math.hypot(harness.x - part.x, harness.y - part.y)).toBeGreaterThanOrEqual(44)
        }
      }
    })
  },
)
