/*
 * American wire gauge: diameter in mm = 0.127 · 92^((36 − n)/39), as ASTM B258 defines it (read in public copies of
 * the formula); 0000 is n = −3, 00 is n = −1. Circular mil: the area of a round wire of a thousandth of an inch.
 */
export const circularMilMm2 = (Math.PI / 4) * 0.0254 ** 2
export const footMetres = 0.3048

/** Diameter of a solid wire of this gauge, mm. */
export function gaugeDiameterMm(n: number): number {
  return 0.127 * 92 ** ((36 - n) / 39)
}

/** Copper area of a solid wire of this gauge, mm². */
export function gaugeAreaMm2(n: number): number {
  return (Math.PI / 4) * gaugeDiameterMm(n) ** 2
}

/** The number n of a written gauge: "14", "0", "0000" (also "4/0"); null where it is none. */
export function readGauge(written: string): number | null {
  const text = written.trim()
  const zeros = /^([1-4])\/0$/.exec(text)
  if (zeros) return 1 - Number(zeros[1])
  if (/^0{1,4}$/.test(text)) return 1 - text.length
  return /^[1-9]$|^[1-3]\d$|^40$/.test(text) ? Number(text) : null
}
