import type { NodeOf } from '../document/node-schema'
import { relaySize } from './part-geometry'
import type { PartState } from './part-state'
import { inkWidth, type Primitive } from './primitive'
import { isDrawn } from './symbol-contact'
import { ink, inkLine, inkPath, inkRound, note } from './symbol-pen'

/** Coil above, contact below, a dashed tie between; the blade stands where the coil has put it. */
export function relaySymbol(node: NodeOf<'relay'>, state: PartState): Primitive[] {
  const { width, height } = relaySize
  const changeover = isDrawn('87a', state)
  const maker = isDrawn('87', state)
  const bladeY = state.pulledIn ? 120 : 101
  return [
    {
      kind: 'rect',
      x: 0,
      y: 0,
      width,
      height,
      fill: 'sheet',
      stroke: 'ink',
      strokeWidth: inkWidth,
      ...(state.pulled ? { dash: '4 4' } : {}),
    },
    ...suppressor(node.suppression),
    inkLine(0, 40, 40, 40),
    inkLine(80, 40, width, 40),
    {
      kind: 'rect',
      x: 40,
      y: 29,
      width: 40,
      height: 22,
      fill: 'sheet',
      stroke: 'ink',
      strokeWidth: inkWidth,
    },
    inkLine(53, 51, 67, 29),
    {
      kind: 'line',
      x1: 60,
      y1: 51,
      x2: 60,
      y2: (120 + bladeY) / 2,
      stroke: 'ink',
      strokeWidth: 1.6,
      dash: '5 4',
    },
    inkLine(0, 120, 32, 120),
    ...(maker ? [inkLine(88, 120, width, 120), inkRound(86, 120, 3.6)] : []),
    ...(changeover ? [inkPath(`M${width} 80H86V96`, undefined, 'none'), inkRound(86, 99, 3.6)] : []),
    inkLine(36, 120, 82, bladeY),
    inkRound(34, 120, 3.6),
    ink(8, 58, '86', 'start'),
    ink(width - 8, 58, '85', 'end'),
    ink(8, 142, '30', 'start'),
    ...(maker ? [ink(width - 8, 142, '87', 'end')] : []),
    ...(changeover ? [ink(width - 7, 75, '87a', 'end')] : []),
    note(54, 78, `${node.coilOhms} ohm`, 'end'),
  ]
}

function suppressor(kind: NodeOf<'relay'>['suppression']): Primitive[] {
  if (kind === 'none') return []
  const around = inkPath('M24 40V14H96V40', undefined, 'none')
  return kind === 'resistor'
    ? [
        around,
        {
          kind: 'rect',
          x: 46,
          y: 8,
          width: 28,
          height: 12,
          fill: 'sheet',
          stroke: 'ink',
          strokeWidth: inkWidth,
        },
      ]
    : [
        around,
        // Blocks while the coil is fed at 86: its bar is on that side.
        { kind: 'path', d: 'M68 7L54 14L68 21Z', fill: 'ink', stroke: 'ink', strokeWidth: 1.6 },
        inkLine(53, 7, 53, 21),
      ]
}
