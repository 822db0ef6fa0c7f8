import { readWireColour } from '../tables/wire-colours'
import type { Paint } from './primitive'

export type VerdictMark = 'faulty' | 'in-question' | 'proved-good'

/** One stroke of a wire's stack; all of them follow the same path. */
export interface Stroke {
  stroke: Paint
  width: number
  dash?: string
  cap: 'butt' | 'round'
}

/** Pixels at 100 %: to 0.5 mm² 4, to 1 5, to 1.5 6, to 2.5 7, to 6 9, above 11. */
export function wireWidth(mm2: number): number {
  if (mm2 <= 0.5) return 4
  if (mm2 <= 1) return 5
  if (mm2 <= 1.5) return 6
  if (mm2 <= 2.5) return 7
  if (mm2 <= 6) return 9
  return 11
}

/** The verdict's band and the gap in sheet colour that keeps the wire off it, bottom up; nothing without a verdict. */
export function bandStrokes(width: number, verdict: VerdictMark | null): Stroke[] {
  switch (verdict) {
    case null:
      return []
    case 'faulty':
      return [
        { stroke: 'ink', width: width + 22, cap: 'butt' },
        { stroke: 'faulty-band', width: width + 18, cap: 'butt' },
        { stroke: 'sheet', width: width + 6, cap: 'butt' },
      ]
    case 'in-question':
      return [
        { stroke: 'question-band', width: width + 17, dash: '3.2 4.2', cap: 'butt' },
        { stroke: 'sheet', width: width + 5, cap: 'butt' },
      ]
    case 'proved-good':
      return [
        { stroke: 'good-band', width: width + 8.4, cap: 'butt' },
        { stroke: 'sheet', width: width + 5.2, cap: 'butt' },
      ]
  }
}

/** The wire itself, bottom up: hairline edge, insulation, stripe. */
export function wireStrokes(wire: { colour: string; mm2: number }): Stroke[] {
  const width = wireWidth(wire.mm2)
  const colour = readWireColour(wire.colour)
  const strokes: Stroke[] = [{ stroke: 'wire-edge', width: width + 1.8, cap: 'butt' }]
  // No letters, or letters of no table: the sheet's own colour inside the edge, so that nothing is claimed.
  if (!colour) return [...strokes, { stroke: 'sheet', width, cap: 'butt' }]
  strokes.push({ stroke: colour.base.ink as Paint, width, cap: 'butt' })
  if (colour.stripe) {
    const close = contrast(colour.base.ink, colour.stripe.ink) < 1.8
    strokes.push({
      stroke: colour.stripe.ink as Paint,
      width: Math.round(width * (close ? 0.56 : 0.38) * 100) / 100,
      dash: close ? '10 8' : '13 5',
      cap: 'butt',
    })
  }
  return strokes
}

/** All strokes of a wire under a verdict, bottom up. */
export function wireStack(wire: { colour: string; mm2: number }, verdict: VerdictMark | null): Stroke[] {
  return [...bandStrokes(wireWidth(wire.mm2), verdict), ...wireStrokes(wire)]
}

/** How far a wire with its band reaches across, so that what passes under it can stop short. */
export function stackWidth(mm2: number, verdict: VerdictMark | null): number {
  const width = wireWidth(mm2)
  return Math.max(width + 9, ...bandStrokes(width, verdict).map((stroke) => stroke.width + 5))
}

/** Black-and-white print: the letters carry the colour. */
export function printStrokes(wire: { colour: string; mm2: number }): Stroke[] {
  const width = Math.round(wireWidth(wire.mm2) * 62) / 100
  const strokes: Stroke[] = [{ stroke: '#000000', width, cap: 'butt' }]
  if (readWireColour(wire.colour)?.stripe)
    strokes.push({ stroke: '#FFFFFF', width: Math.round(width * 38) / 100, dash: '13 5', cap: 'butt' })
  return strokes
}

/** Contrast of two sRGB colours, WCAG 2.2, "contrast ratio" and "relative luminance". */
export function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].toSorted((x, y) => y - x) as [number, number]
  return (light + 0.05) / (dark + 0.05)
}

function luminance(hex: string): number {
  const channel = (at: number) => {
    const value = Number.parseInt(hex.slice(at, at + 2), 16) / 255
    return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4
  }
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5)
}
