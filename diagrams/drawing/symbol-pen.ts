import { inkWidth, type Paint, type Primitive } from './primitive'

type Text = Extract<Primitive, { kind: 'text' }>

export function inkLine(x1: number, y1: number, x2: number, y2: number): Primitive {
  return { kind: 'line', x1, y1, x2, y2, stroke: 'ink', strokeWidth: inkWidth, cap: 'round' }
}

export function inkPath(d: string, dash?: string, fill: Paint = 'sheet'): Primitive {
  return { kind: 'path', d, fill, stroke: 'ink', strokeWidth: inkWidth, ...(dash ? { dash } : {}) }
}

export function inkRound(cx: number, cy: number, r: number, fill: Paint = 'sheet'): Primitive {
  return { kind: 'circle', cx, cy, r, fill, stroke: 'ink', strokeWidth: inkWidth }
}

/** Bold figures and names. */
export function ink(x: number, y: number, text: string, anchor: Text['anchor']): Text {
  return { kind: 'text', x, y, text, size: 13.5, weight: 700, anchor, fill: 'ink' }
}

/** Second text. */
export function note(x: number, y: number, text: string, anchor: Text['anchor']): Text {
  return { kind: 'text', x, y, text, size: 13, weight: 600, anchor, fill: 'ink-2' }
}
