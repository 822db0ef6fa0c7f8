import { sigmaOf, type Measured } from './measured'

/**
 * How far a sum of measured figures may be off, to first order: `sigma` is the root of the summed squares of what each
 * figure's own sigma moves, `reach` the plain sum of what each limit moves. Slopes by central differences.
 */
export function spreadOf(
  figures: readonly Measured[],
  formula: (values: readonly number[]) => number,
): { sigma: number; reach: number } {
  const values = figures.map((figure) => figure.value)
  let squares = 0
  let reach = 0
  figures.forEach((figure, i) => {
    const step = (figure.high - figure.low) / 1e4
    if (step <= 0) return
    const moved = (by: number) => formula(values.with(i, figure.value + by))
    const slope = (moved(step) - moved(-step)) / (2 * step)
    squares += (slope * sigmaOf(figure)) ** 2
    reach += Math.abs(slope) * Math.max(figure.high - figure.value, figure.value - figure.low)
  })
  return { sigma: Math.sqrt(squares), reach }
}
