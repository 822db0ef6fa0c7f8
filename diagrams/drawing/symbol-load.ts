import type { NodeOf } from '../document/node-schema'
import type { PartState } from './part-state'
import { inkWidth, type Primitive } from './primitive'
import { ink, inkLine, inkPath, inkRound } from './symbol-pen'

/** A consumer in its 80 by 40 box; one that works shows it: rays, an arrow round the motor, strokes of sound. */
export function loadSymbol(node: NodeOf<'load'>, state: PartState): Primitive[] {
  const works = state.works === true
  switch (node.style) {
    case 'lamp':
      return [
        ...leads(22),
        inkRound(40, 20, 19),
        inkLine(26.6, 6.6, 53.4, 33.4),
        inkLine(26.6, 33.4, 53.4, 6.6),
        ...(works ? rays() : []),
      ]
    case 'motor':
      return [
        ...leads(22),
        inkRound(40, 20, 19),
        { ...ink(40, 26, 'M', 'middle'), size: 17 },
        ...(works ? [inkPath('M24 -4Q40 -13 56 -4M49 -8L56 -4L53 -11', undefined, 'none')] : []),
      ]
    case 'solenoid':
      return [
        ...leads(26),
        box(16, 8, 48, 24),
        inkLine(33, 32, 47, 8),
        inkPath(works ? 'M54 0H70M64 -5L70 0L64 5' : 'M54 0H64M58 -5L64 0L58 5', undefined, 'none'),
      ]
    case 'heater':
      return [
        ...leads(24),
        box(14, 8, 52, 24),
        inkLine(27, 8, 27, 32),
        inkLine(40, 8, 40, 32),
        inkLine(53, 8, 53, 32),
        ...(works ? [inkPath('M27 3Q23 -2 27 -7M40 3Q36 -2 40 -7M53 3Q49 -2 53 -7', undefined, 'none')] : []),
      ]
    case 'horn':
      return [
        ...leads(22),
        inkPath('M26 13H36L52 3V37L36 27H26Z'),
        inkLine(52, 20, 62, 20),
        ...(works ? [inkPath('M58 8Q64 4 66 -2M58 32Q64 36 66 42', undefined, 'none')] : []),
      ]
    case 'other':
      return [
        ...leads(26),
        box(18, 6, 44, 28),
        ...(works ? [inkPath('M32 20L38 26L49 13', undefined, 'none')] : []),
      ]
  }
}

function leads(inner: number): Primitive[] {
  return [inkLine(0, 20, inner, 20), inkLine(80 - inner, 20, 80, 20)]
}

function box(x: number, y: number, width: number, height: number): Primitive {
  return { kind: 'rect', x, y, width, height, fill: 'sheet', stroke: 'ink', strokeWidth: inkWidth }
}

/** Five rays over the lamp, clear of its leads and of the name below it. */
function rays(): Primitive[] {
  return [-150, -120, -90, -60, -30].map((degrees) => {
    const angle = (degrees * Math.PI) / 180
    const at = (reach: number) => [40 + reach * Math.cos(angle), 20 + reach * Math.sin(angle)] as const
    const [x1, y1] = at(24)
    const [x2, y2] = at(32)
    return inkLine(round(x1), round(y1), round(x2), round(y2))
  })
}

function round(value: number): number {
  return Math.round(value * 10) / 10
}
