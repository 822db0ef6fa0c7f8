import type { Node } from '../document/node-schema'
import { hasContact, portsOf } from '../document/ports'
import { portPlace } from './part-geometry'
import type { PartState } from './part-state'
import { inkWidth, type Primitive } from './primitive'

const cupRadius = 9
const unpluggedPixels = 14

/**
 * The contact between a wire and its part: a half-round cup on the part's edge with a dot. Unplugged, the cup moves
 * 14 px off with its wire and stands open.
 */
export function contactSymbols(node: Node, state: PartState): Primitive[] {
  return portsOf(node).flatMap((port): Primitive[] => {
    if (!hasContact(node, port) || !isDrawn(port.name, state)) return []
    const { x, y, side } = portPlace(node, port.name)
    const [outX, outY] =
      side === 'left' ? [-1, 0] : side === 'right' ? [1, 0] : side === 'top' ? [0, -1] : [0, 1]
    const dot: Primitive = { kind: 'circle', cx: x + outX * 2.5, cy: y + outY * 2.5, r: 3.4, fill: 'ink' }
    const cup = (shift: number): string => {
      const cx = x + outX * shift
      const cy = y + outY * shift
      const level = outX !== 0
      const from = level ? `${cx} ${cy - cupRadius}` : `${cx - cupRadius} ${cy}`
      const to = level ? `${cx} ${cy + cupRadius}` : `${cx + cupRadius} ${cy}`
      const sweep = outX < 0 || outY > 0 ? 0 : 1
      return `M${from}A${cupRadius} ${cupRadius} 0 0 ${sweep} ${to}`
    }
    if (!state.unplugged.has(port.name))
      return [{ kind: 'path', d: `${cup(0)}Z`, fill: 'sheet', stroke: 'ink', strokeWidth: inkWidth }, dot]
    const reach = unpluggedPixels + cupRadius - 1
    return [
      // The wire's last stretch went with the cup.
      {
        kind: 'rect',
        x: Math.min(x, x + outX * reach) - (outX === 0 ? cupRadius + 2 : 0),
        y: Math.min(y, y + outY * reach) - (outY === 0 ? cupRadius + 2 : 0),
        width: outX === 0 ? 2 * cupRadius + 4 : reach,
        height: outY === 0 ? 2 * cupRadius + 4 : reach,
        fill: 'sheet',
      },
      {
        kind: 'path',
        d: cup(unpluggedPixels),
        fill: 'none',
        stroke: 'ink',
        strokeWidth: inkWidth,
        cap: 'round',
      },
      dot,
    ]
  })
}

/** A changeover terminal that nothing is wired to is left out of the drawing. */
export function isDrawn(port: string, state: PartState): boolean {
  return state.wired === null || state.wired.has(port)
}
