export const mean = (list: readonly number[]): number =>
  list.length === 0 ? Number.NaN : list.reduce((sum, x) => sum + x, 0) / list.length

/** The value under which the given share of a list lies, by nearest rank. */
export function quantile(list: readonly number[], share: number): number {
  const sorted = list.toSorted((a, b) => a - b)
  return sorted[Math.min(sorted.length - 1, Math.max(0, Math.ceil(share * sorted.length) - 1))] ?? Number.NaN
}

export const median = (list: readonly number[]): number => quantile(list, 0.5)

/** Exponent of y ∝ x^p through all points, by least squares on logarithms. */
export function exponentOf(points: readonly (readonly [number, number])[]): number {
  const xs = points.map(([x]) => Math.log(x))
  const ys = points.map(([, y]) => Math.log(y))
  const [mx, my] = [mean(xs), mean(ys)]
  let top = 0
  let bottom = 0
  xs.forEach((x, i) => {
    top += (x - mx) * (ys[i]! - my)
    bottom += (x - mx) ** 2
  })
  return top / bottom
}

/** Processor time of this process, milliseconds: the machine may be shared. */
export function processorMs(work: () => void): number {
  const before = process.cpuUsage()
  work()
  const used = process.cpuUsage(before)
  return (used.user + used.system) / 1000
}

export const percent = (part: number, digits = 1): string => `${(100 * part).toFixed(digits)} %`
