/** Names of the product's colour tokens; whoever renders decides what a token looks like in which theme. */
export const tokens = [
  'ink',
  'on-ink',
  'ink-2',
  'ink-3',
  'sheet',
  'window',
  'panel',
  'line',
  'edge',
  'wire-edge',
  'faulty',
  'faulty-band',
  'question',
  'question-band',
  'good',
  'good-band',
] as const
export type Token = (typeof tokens)[number]

/** A token, a wire's own colour in sRGB, or nothing. */
export type Paint = Token | `#${string}` | 'none'

interface Stroked {
  stroke?: Paint
  /** Pixels at 100 %. */
  strokeWidth?: number
  dash?: string
  dashOffset?: number
  cap?: 'butt' | 'round'
  fill?: Paint
}

/** What a drawing is made of: plain data, the same for the sheet, an SVG file and a print. */
export type Primitive =
  | ({ kind: 'path'; d: string } & Stroked)
  | ({ kind: 'circle'; cx: number; cy: number; r: number } & Stroked)
  | ({ kind: 'rect'; x: number; y: number; width: number; height: number; radius?: number } & Stroked)
  | ({ kind: 'line'; x1: number; y1: number; x2: number; y2: number } & Stroked)
  | {
      kind: 'text'
      x: number
      y: number
      text: string
      size: number
      weight: number
      anchor: 'start' | 'middle' | 'end'
      fill: Paint
      /** Columns of figures use the mono face. */
      mono?: boolean
    }

export interface Place {
  x: number
  y: number
}

export interface Box {
  x: number
  y: number
  width: number
  height: number
}

/** Line width of every symbol. */
export const inkWidth = 2.2

/** Width of a text in the drawing's face, near enough to place labels: measured means in em by kind of letter. */
export function textWidth(text: string, size: number, mono = false): number {
  if (mono) return Math.ceil(text.length * size * 0.62)
  let em = 0
  for (const letter of text)
    em += /[A-Z0-9MW@%]/.test(letter) ? 0.63 : /[ .,:;/'()|!il-]/.test(letter) ? 0.34 : 0.54
  return Math.ceil(em * size)
}

export function boxesMeet(one: Box, other: Box): boolean {
  return (
    one.x < other.x + other.width &&
    other.x < one.x + one.width &&
    one.y < other.y + other.height &&
    other.y < one.y + one.height
  )
}

export function grow(box: Box, by: number): Box {
  return { x: box.x - by, y: box.y - by, width: box.width + 2 * by, height: box.height + 2 * by }
}
