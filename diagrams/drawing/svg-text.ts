import type { Paint, Primitive, Token } from './primitive'
import { inkOf, lightInks } from './theme-inks'

export type Inks = Readonly<Record<Token, string>>

const face = "'Atkinson Hyperlegible Next', 'Atkinson Hyperlegible Next Variable', sans-serif"
const monoFace = "'Atkinson Hyperlegible Mono', 'Atkinson Hyperlegible Mono Variable', monospace"

/** Primitives as SVG markup, painted by attributes alone so that any program shows the same. */
export function primitivesToSvg(primitives: readonly Primitive[], inks: Inks = lightInks): string {
  return primitives.map((one) => primitiveToSvg(one, inks)).join('')
}

function primitiveToSvg(one: Primitive, inks: Inks): string {
  if (one.kind === 'text')
    return `<text${attributes({
      x: one.x,
      y: one.y,
      'font-family': one.mono ? monoFace : face,
      'font-size': one.size,
      'font-weight': one.weight,
      'text-anchor': one.anchor,
      fill: inkOf(one.fill, inks),
    })}>${escapeXml(one.text)}</text>`
  const paint = {
    fill: inkOf(one.fill ?? 'none', inks),
    stroke: one.stroke === undefined ? undefined : inkOf(one.stroke as Paint, inks),
    'stroke-width': one.strokeWidth,
    'stroke-dasharray': one.dash,
    'stroke-dashoffset': one.dashOffset,
    'stroke-linecap': one.cap,
    'stroke-linejoin': one.stroke === undefined ? undefined : 'round',
  }
  switch (one.kind) {
    case 'path':
      return `<path${attributes({ d: one.d, ...paint })}/>`
    case 'circle':
      return `<circle${attributes({ cx: one.cx, cy: one.cy, r: one.r, ...paint })}/>`
    case 'rect':
      return `<rect${attributes({ x: one.x, y: one.y, width: one.width, height: one.height, rx: one.radius, ...paint })}/>`
    case 'line':
      return `<line${attributes({ x1: one.x1, y1: one.y1, x2: one.x2, y2: one.y2, ...paint })}/>`
  }
}

function attributes(values: Record<string, string | number | undefined>): string {
  return Object.entries(values)
    .flatMap(([name, value]) => (value === undefined ? [] : [` ${name}="${escapeXml(String(value))}"`]))
    .join('')
}

/** Text for XML content and attributes; characters that XML 1.0 does not allow at all are dropped. */
export function escapeXml(text: string): string {
  return text
    .replace(/[^\t\n\r\u0020-\uD7FF\uE000-\uFFFD\u{10000}-\u{10FFFF}]/gu, '')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
    .replace(/'/g, '&#39;')
}
