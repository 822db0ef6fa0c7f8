import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { crossings, visiblePieces } from '@/diagrams/drawing/crossings'
import { gridPixels, partBox, portPlace } from '@/diagrams/drawing/part-geometry'
import { routeLength, wirePath } from '@/diagrams/drawing/wire-path'
import { wireRoute } from '@/diagrams/drawing/wire-route'
import { portsOf } from '@/diagrams/document/ports'
import { anyCircuit } from './random-circuit'

describe('wire routes', () => {
  it('run level or upright only and join their two ports, whatever is drawn', () => {
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        for (const wire of circuit.wires) {
          const route = wireRoute(circuit, wire)
          const place = (end: string) => {
            const [id, port] = end.split('.') as [string, string]
            const node = circuit.nodes.find((one) => one.id === id)!
            const { x, y } = portPlace(node, port)
            return { x: node.x + x, y: node.y + y }
          }
          expect(route[0]).toEqual(place(wire.from))
          expect(route.at(-1)).toEqual(place(wire.to))
          for (let at = 1; at < route.length; at++)
            expect(route[at - 1]!.x === route[at]!.x || route[at - 1]!.y === route[at]!.y).toBe(true)
        }
      }),
      { numRuns: 300, seed: 7 },
    )
  })

  it('land on the grid: every port of every kind of part lies on it', () => {
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        for (const node of circuit.nodes)
          for (const port of portsOf(node)) {
            const { x, y } = portPlace(node, port.name)
            const box = partBox(node)
            expect([x % gridPixels, y % gridPixels], `${node.kind}.${port.name}`).toEqual([0, 0])
            expect(x >= 0 && x <= box.width && y >= 0 && y <= box.height).toBe(true)
          }
      }),
      { numRuns: 100, seed: 3 },
    )
  })

  it('turn with rounded corners that never reach past half a run', () => {
    const corner = [
      { x: 0, y: 0 },
      { x: 10, y: 0 },
      { x: 10, y: 100 },
    ]
    expect(wirePath(corner)).toBe('M0 0L5 0Q10 0 10 5L10 100')
  })
})

describe('crossings', () => {
  const level = {
    id: 'level',
    route: [
      { x: 0, y: 50 },
      { x: 100, y: 50 },
    ],
    gapPixels: 14,
  }
  const upright = {
    id: 'upright',
    route: [
      { x: 40, y: 0 },
      { x: 40, y: 100 },
    ],
    gapPixels: 13,
  }

  it('let the upright wire pass under the level one, with the gap of the one above', () => {
    const found = crossings([level, upright])
    expect(found).toEqual([
      { over: 'level', under: 'upright', at: { x: 40, y: 50 }, along: 50, gapPixels: 14 },
    ])
    expect(visiblePieces(level, found)).toHaveLength(1)
    expect(visiblePieces(upright, found)).toEqual([
      {
        points: [
          { x: 40, y: 0 },
          { x: 40, y: 43 },
        ],
        startsAt: 0,
      },
      {
        points: [
          { x: 40, y: 57 },
          { x: 40, y: 100 },
        ],
        startsAt: 57,
      },
    ])
  })

  it('are none where wires meet end to end', () => {
    const meeting = {
      id: 'meeting',
      route: [
        { x: 40, y: 50 },
        { x: 40, y: 100 },
      ],
      gapPixels: 14,
    }
    expect(crossings([level, meeting])).toEqual([])
  })

  it('never draw more of a wire than there is', () => {
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        const routed = circuit.wires.map((wire) => ({
          id: wire.id,
          route: wireRoute(circuit, wire),
          gapPixels: 14,
        }))
        const found = crossings(routed)
        for (const wire of routed) {
          const drawn = visiblePieces(wire, found).reduce((sum, piece) => sum + routeLength(piece.points), 0)
          expect(drawn).toBeLessThanOrEqual(routeLength(wire.route) + 1e-6)
        }
      }),
      { numRuns: 200, seed: 11 },
    )
  })
})
