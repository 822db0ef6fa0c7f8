import type { Node, NodeOf } from '../document/node-schema'
import { portsOf } from '../document/ports'
import { dlcSize, portPlace } from './part-geometry'
import { restState, type PartState } from './part-state'
import { inkWidth, type Primitive } from './primitive'
import { contactSymbols } from './symbol-contact'
import { loadSymbol } from './symbol-load'
import { moduleSymbol } from './symbol-module'
import { relaySymbol } from './symbol-relay'
import { switchSymbol } from './symbol-switch'
import { ink, inkLine, inkPath, note } from './symbol-pen'

/** A part as it looks just now, from its box's top left corner; its label comes from `partLabels`. */
export function partSymbol(node: Node, state: PartState = restState): Primitive[] {
  return [...body(node, state), ...contactSymbols(node, state)]
}

function body(node: Node, state: PartState): Primitive[] {
  switch (node.kind) {
    case 'battery':
      return [
        inkLine(20, 40, 20, 20),
        // Nothing wired to the minus: it is bonded to chassis.
        ...(state.wired?.has('neg') === false
          ? [
              inkLine(20, 40, 20, 44),
              inkLine(6, 44, 34, 44),
              inkLine(11, 50, 29, 50),
              inkLine(16, 56, 24, 56),
            ]
          : []),
        inkLine(20, 20, 25, 20),
        { kind: 'line', x1: 26, y1: 11, x2: 26, y2: 29, stroke: 'ink', strokeWidth: 6 },
        inkLine(36, 3, 36, 37),
        inkLine(36, 20, 60, 20),
        inkLine(45, 10, 53, 10),
        inkLine(49, 6, 49, 14),
      ]
    case 'feed':
      return [
        inkPath('M1 4H44L60 20L44 36H1Z', state.dead ? '4 4' : undefined),
        note(27, 25, `${volts(node)} V`, 'middle'),
      ]
    case 'ground':
      return [
        inkLine(20, 0, 20, 16),
        inkLine(4, 16, 36, 16),
        inkLine(10, 23, 30, 23),
        inkLine(16, 30, 24, 30),
      ]
    case 'fuse':
      return fuseSymbol(node, state)
    case 'cavity':
      return [
        {
          kind: 'rect',
          x: 1,
          y: 6,
          width: 58,
          height: 28,
          radius: 14,
          fill: 'sheet',
          stroke: 'ink',
          strokeWidth: inkWidth,
          ...(state.unplugged.size > 0 ? { dash: '4 4' } : {}),
        },
        inkPath('M19 6Q29 20 19 34', undefined, 'none'),
        note(11.5, 24.5, 'a', 'middle'),
        { ...ink(39, 25, String(node.number), 'middle'), size: 15, weight: 700 },
        ...(state.unplugged.size > 0 ? [gapAcross()] : []),
      ]
    case 'splice':
      return [
        { kind: 'circle', cx: 20, cy: 20, r: 9.5, fill: 'sheet' },
        { kind: 'circle', cx: 20, cy: 20, r: 7.5, fill: 'ink' },
      ]
    case 'resistor':
      return [
        inkLine(0, 20, 18, 20),
        inkLine(62, 20, 80, 20),
        {
          kind: 'rect',
          x: 18,
          y: 12,
          width: 44,
          height: 16,
          fill: 'sheet',
          stroke: 'ink',
          strokeWidth: inkWidth,
        },
      ]
    case 'diode':
      return [
        inkLine(0, 20, 80, 20),
        { kind: 'path', d: 'M28 8L50 20L28 32Z', fill: 'ink', stroke: 'ink', strokeWidth: inkWidth },
        inkLine(51, 8, 51, 32),
      ]
    case 'load':
      return loadSymbol(node, state)
    case 'switch':
      return switchSymbol(node, state)
    case 'relay':
      return relaySymbol(node, state)
    case 'module':
      return moduleSymbol(node)
    case 'dlc':
      return dlcSymbol(node)
  }
}

function volts(node: NodeOf<'feed'>): number {
  // Drawn as the trade says it: a 12.6 V feed is "12 V".
  return node.volts >= 8 ? Math.floor(node.volts) : node.volts
}

function fuseSymbol(node: NodeOf<'fuse'>, state: PartState): Primitive[] {
  const box: Primitive = {
    kind: 'rect',
    x: 8,
    y: 10,
    width: 44,
    height: 20,
    fill: 'sheet',
    stroke: 'ink',
    strokeWidth: inkWidth,
    ...(state.pulled ? { dash: '4 4' } : {}),
  }
  const stubs = [inkLine(0, 20, 8, 20), inkLine(52, 20, 60, 20)]
  if (state.pulled) return [...stubs, box]
  if (state.blown)
    return [
      ...stubs,
      box,
      inkLine(8, 20, 24, 20),
      inkLine(36, 20, 52, 20),
      inkPath('M24 20L28 15M36 20L32 25'),
    ]
  return node.style === 'link'
    ? [...stubs, box, inkPath('M8 20C18 10 24 10 30 20S42 30 52 20', undefined, 'none')]
    : [...stubs, box, inkLine(8, 20, 52, 20)]
}

/** An open inline connector: its two halves stand apart. */
function gapAcross(): Primitive {
  return { kind: 'rect', x: 25, y: 3, width: 5, height: 34, fill: 'sheet' }
}

function dlcSymbol(node: NodeOf<'dlc'>): Primitive[] {
  const { width, height } = dlcSize
  return [
    inkPath(
      `M4 0H${width - 4}Q${width} 0 ${width - 2} 5L${width - 18} ${height - 5}Q${width - 20} ${height} ${width - 24} ${height}H24Q20 ${height} 18 ${height - 5}L2 5Q0 0 4 0Z`,
    ),
    ...portsOf(node).flatMap((port): Primitive[] => {
      const { x, side } = portPlace(node, port.name)
      const y = side === 'top' ? 12 : height - 38
      return [
        {
          kind: 'rect',
          x: x - 13,
          y,
          width: 26,
          height: 26,
          radius: 3,
          fill: 'window',
          stroke: 'ink',
          strokeWidth: 1.5,
        },
        { ...ink(x, y + 17.5, port.name, 'middle'), size: 13 },
        ...(side === 'top' ? [inkLine(x, 0, x, 12)] : [inkLine(x, height, x, height - 12)]),
      ]
    }),
  ]
}
