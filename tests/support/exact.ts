/** Fractions of whole numbers without end: arithmetic that rounds nothing, for a reference. */
export interface Fraction {
  top: bigint
  bottom: bigint
}

/** The exact value of a double. */
export function fraction(value: number): Fraction {
  let bottom = 1n
  let scaled = value
  while (!Number.isInteger(scaled)) {
    scaled *= 2
    bottom *= 2n
  }
  return { top: BigInt(scaled), bottom }
}

const lowest = ({ top, bottom }: Fraction): Fraction => {
  let [a, b] = [top < 0n ? -top : top, bottom]
  while (b !== 0n) [a, b] = [b, a % b]
  return a === 0n ? { top: 0n, bottom: 1n } : { top: top / a, bottom: bottom / a }
}
export const plus = (x: Fraction, y: Fraction): Fraction =>
  lowest({ top: x.top * y.bottom + y.top * x.bottom, bottom: x.bottom * y.bottom })
export const times = (x: Fraction, y: Fraction): Fraction =>
  lowest({ top: x.top * y.top, bottom: x.bottom * y.bottom })
export const minus = (x: Fraction, y: Fraction): Fraction => plus(x, { ...y, top: -y.top })
export const over = (x: Fraction, y: Fraction): Fraction =>
  times(x, y.top < 0n ? { top: -y.bottom, bottom: -y.top } : { top: y.bottom, bottom: y.top })

/** The nearest double, near enough: to 60 bits before it is rounded. */
export function toNumber({ top, bottom }: Fraction): number {
  if (top === 0n) return 0
  const size = (n: bigint) => (n < 0n ? -n : n).toString(2).length
  const shift = 60 - size(top) + size(bottom)
  const scaled = shift >= 0 ? (top << BigInt(shift)) / bottom : top / (bottom << BigInt(-shift))
  return Number(scaled) * 2 ** -shift
}

/** Solves matrix · x = right side by plain elimination, exactly. */
export function solveExactly(matrix: Fraction[][], right: Fraction[]): Fraction[] {
  const n = right.length
  const m = matrix.map((row, i) => [...row, right[i]!])
  for (let k = 0; k < n; k++)
    for (let i = 0; i < n; i++) {
      const pivot = m[k]![k]!
      if (i === k || m[i]![k]!.top === 0n) continue
      const factor = over(m[i]![k]!, pivot)
      for (let j = k; j <= n; j++) m[i]![j] = minus(m[i]![j]!, times(factor, m[k]![j]!))
    }
  return m.map((row, i) => over(row[n]!, row[i]!))
}
