/** A binary fraction of 320 bits: mantissa · 2^exponent. About 96 digits, for a reference. */
export interface Big {
  mantissa: bigint
  exponent: number
}

const bits = 320

const sizeOf = (n: bigint): number => (n < 0n ? -n : n).toString(16).length * 4

function rounded(mantissa: bigint, exponent: number): Big {
  const over = sizeOf(mantissa) - bits
  return over <= 0
    ? { mantissa, exponent }
    : { mantissa: mantissa >> BigInt(over), exponent: exponent + over }
}

/** The exact value of a double. */
export function big(value: number): Big {
  let exponent = 0
  let scaled = value
  while (!Number.isInteger(scaled)) {
    scaled *= 2
    exponent--
  }
  return { mantissa: BigInt(scaled), exponent }
}

export const zero: Big = { mantissa: 0n, exponent: 0 }

export function add(x: Big, y: Big): Big {
  if (x.mantissa === 0n) return y
  if (y.mantissa === 0n) return x
  const [high, low] = x.exponent >= y.exponent ? [x, y] : [y, x]
  const shift = high.exponent - low.exponent
  // What lies wholly beyond the last bit does not count.
  if (shift > 2 * bits + sizeOf(low.mantissa)) return high
  return rounded((high.mantissa << BigInt(shift)) + low.mantissa, low.exponent)
}
export const negative = (x: Big): Big => ({ ...x, mantissa: -x.mantissa })
export const subtract = (x: Big, y: Big): Big => add(x, negative(y))
export const multiply = (x: Big, y: Big): Big => rounded(x.mantissa * y.mantissa, x.exponent + y.exponent)
export function divide(x: Big, y: Big): Big {
  const shift = bits + sizeOf(y.mantissa)
  return rounded((x.mantissa << BigInt(shift)) / y.mantissa, x.exponent - y.exponent - shift)
}

/** The nearest double, to 60 bits before it is rounded. */
export function toDouble({ mantissa, exponent }: Big): number {
  const over = sizeOf(mantissa) - 60
  if (over <= 0) return Number(mantissa) * 2 ** exponent
  return Number(mantissa >> BigInt(over)) * 2 ** (exponent + over)
}

export interface BigElement {
  a: number
  b: number
  ohms: number
  volts: number
}

/**
 * Volts per net of a linear netlist (net 0 is chassis), by nodal analysis and plain sparse elimination
 * with these fractions. `driven`: one ampere into one net and out of another in place of all sources.
 */
export function solveBig(
  nets: number,
  elements: readonly BigElement[],
  driven?: readonly [number, number],
): Big[] {
  const rows = Array.from({ length: nets }, () => new Map<number, Big>())
  const right = Array.from({ length: nets }, () => zero)
  const put = (i: number, j: number, x: Big) => rows[i]!.set(j, add(rows[i]!.get(j) ?? zero, x))
  for (const { a, b, ohms, volts } of elements) {
    if (a === b) continue
    const g = divide(big(1), big(ohms))
    put(a, a, g)
    put(b, b, g)
    put(a, b, negative(g))
    put(b, a, negative(g))
    if (driven || volts === 0) continue
    const amps = multiply(g, big(volts))
    right[a] = add(right[a]!, amps)
    right[b] = subtract(right[b]!, amps)
  }
  if (driven) {
    right[driven[0]] = add(right[driven[0]]!, big(1))
    right[driven[1]] = subtract(right[driven[1]]!, big(1))
  }
  const left = new Set(Array.from({ length: nets - 1 }, (_, i) => i + 1))
  const order: number[] = []
  while (left.size > 0) {
    // Fewest neighbours first.
    let k = -1
    for (const net of left) if (k < 0 || rows[net]!.size < rows[k]!.size) k = net
    left.delete(k)
    order.push(k)
    const pivot = rows[k]!.get(k)!
    for (const i of rows[k]!.keys()) {
      if (!left.has(i)) continue
      const factor = divide(rows[i]!.get(k)!, pivot)
      for (const [j, x] of rows[k]!) if (left.has(j)) put(i, j, negative(multiply(factor, x)))
      right[i] = subtract(right[i]!, multiply(factor, right[k]!))
      rows[i]!.delete(k)
    }
  }
  const volts = Array.from({ length: nets }, () => zero)
  for (const k of order.toReversed()) {
    let sum = right[k]!
    for (const [j, x] of rows[k]!) if (j !== k && j !== 0) sum = subtract(sum, multiply(x, volts[j]!))
    volts[k] = divide(sum, rows[k]!.get(k)!)
  }
  return volts
}
