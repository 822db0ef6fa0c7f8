import type { Random } from './random'

/** A number in [0, 1], drawn in some way. */
export type Draw = () => number

/**
 * Ways to draw that an evaluator which thinks of even and normal spreads does not expect, all inside
 * the same bounds: at the corners, U-shaped, crowded to one side, everything alike, just inside the ends.
 */
export const oddShapes = [
  'even',
  'corners',
  'u-shaped',
  'low',
  'high',
  'alike',
  'ends',
  'all-low',
  'all-high',
] as const
export type OddShape = (typeof oddShapes)[number]

export function drawOf(shape: OddShape, random: Random): Draw {
  const { next } = random
  switch (shape) {
    case 'even':
      return next
    case 'corners':
      return () => (next() < 0.5 ? 0 : 1)
    case 'u-shaped':
      // Arcsine law.
      return () => Math.sin((Math.PI / 2) * next()) ** 2
    case 'low':
      return () => next() ** 4
    case 'high':
      return () => 1 - next() ** 4
    case 'alike': {
      const once = next()
      return () => once
    }
    case 'ends':
      return () => (next() < 0.5 ? 1e-4 * next() : 1 - 1e-4 * next())
    case 'all-low':
      return () => 0
    case 'all-high':
      return () => 1
  }
}
