/**
 * Standard normal distribution function, absolute error below 1e-7
 * (Abramowitz and Stegun, Handbook of Mathematical Functions, 1964, 7.1.26).
 */
export function normalBelow(x: number): number {
  const t = 1 / (1 + 0.3275911 * (Math.abs(x) / Math.SQRT2))
  const poly =
    t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))))
  const tail = 0.5 * poly * Math.exp((-x * x) / 2)
  return x > 0 ? 1 - tail : tail
}

/** Normal density. */
export function normalDensity(x: number, mean: number, sigma: number): number {
  const z = (x - mean) / sigma
  return Math.exp(-0.5 * z * z) / (sigma * 2.5066282746310002)
}

/** Density at x of a mean spread evenly from a to b, with normal error. */
export function smearedDensity(x: number, a: number, b: number, sigma: number): number {
  const width = Math.abs(b - a)
  if (width < 0.2 * sigma) return normalDensity(x, (a + b) / 2, sigma)
  const low = Math.min(a, b)
  return (normalBelow((x - low) / sigma) - normalBelow((x - low - width) / sigma)) / width
}
