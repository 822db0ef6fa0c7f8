import type { Circuit } from '../document/circuit-schema'
import { moduleLayout } from './module-layout'
import { endPlace, nodesById, partBox, relaySize } from './part-geometry'
import { textWidth, type Box, type Place, type Primitive } from './primitive'
import { inkPath } from './symbol-pen'
import { switchLayout } from './switch-layout'
import { alongRoute, routeLength } from './wire-path'
import { wireRoute } from './wire-route'
import type { VerdictMark } from './wire-stroke'

/** Where a place lies on the sheet: the shape a ring is drawn round, and where its glyph goes. */
export interface PlaceMark {
  /** Null for a wire: its band follows the wire itself. */
  ring: (Box & { radius: number }) | null
  glyph: Place
}

/** The mark's place for a site such as `contact:k3.86`; null when the circuit has no such place. */
export function placeMark(circuit: Circuit, site: string): PlaceMark | null {
  const colon = site.indexOf(':')
  const kind = site.slice(0, colon)
  const rest = site.slice(colon + 1)
  if (kind === 'wire') {
    const wire = circuit.wires.find((one) => one.id === rest)
    if (!wire) return null
    const route = wireRoute(circuit, wire)
    const middle = alongRoute(route, routeLength(route) / 2)
    return middle ? { ring: null, glyph: middle.at } : null
  }
  const nodes = nodesById(circuit.nodes)
  const dot = rest.indexOf('.')
  const node = nodes.get(dot < 0 ? rest : rest.slice(0, dot))
  const tail = dot < 0 ? '' : rest.slice(dot + 1)
  if (!node) return null
  const { width, height } = partBox(node)
  const at = (box: Box, radius: number): PlaceMark => ({
    ring: { x: node.x + box.x, y: node.y + box.y, width: box.width, height: box.height, radius },
    glyph: { x: node.x + box.x + box.width + 4, y: node.y + box.y - 6 },
  })
  if (kind === 'contact' && node.kind !== 'cavity') {
    const port = endPlace(nodes, rest)
    if (!port) return null
    const outX = port.side === 'left' ? -4 : port.side === 'right' ? 4 : 0
    const outY = port.side === 'top' ? -4 : port.side === 'bottom' ? 4 : 0
    return {
      ring: { x: port.x + outX - 13, y: port.y + outY - 13, width: 26, height: 26, radius: 13 },
      glyph: { x: port.x + 3 * outX, y: port.y + (outY === 0 ? 24 : 3 * outY) },
    }
  }
  switch (node.kind) {
    case 'cavity':
      return at({ x: -4, y: 1, width: 68, height: 38 }, 19)
    case 'splice':
      return at({ x: 9, y: 9, width: 22, height: 22 }, 11)
    case 'ground':
      return {
        ring: { x: node.x + 2, y: node.y + 9, width: 36, height: 25, radius: 4 },
        glyph: { x: node.x - 14, y: node.y + 22 },
      }
    case 'fuse':
      return at({ x: 5, y: 7, width: 50, height: 26 }, 4)
    case 'resistor':
    case 'diode':
      return at({ x: 16, y: 8, width: 48, height: 24 }, 4)
    case 'feed':
      return at({ x: -1, y: 3, width: 60, height: 34 }, 4)
    case 'switch': {
      const row = switchLayout(node).contacts.find((one) => one.contact.id === tail)
      return at({ x: 30, y: (row?.y ?? 40) - 14, width: 60, height: 22 }, 4)
    }
    case 'relay':
      return tail === 'coil'
        ? at({ x: 34, y: 23, width: 52, height: 34 }, 4)
        : at({ x: 24, y: 90, width: relaySize.width - 48, height: 40 }, 4)
    case 'module': {
      if (kind !== 'pin')
        return {
          ring: { x: node.x - 4, y: node.y - 4, width: width + 8, height: height + 8, radius: 4 },
          glyph: { x: node.x + width - 14, y: node.y - 18 },
        }
      const row = moduleLayout(node).rows.find((one) => one.pin.pin === tail)
      if (!row) return null
      const wide = 10 + 8.4 * tail.length
      const words = wide + 20 + Math.max(textWidth(row.pin.name, 13), textWidth(row.circuit, 13))
      const left = row.side === 'left'
      return {
        ring: {
          x: node.x + (left ? 11 : width - 11 - wide),
          y: node.y + row.y - 11,
          width: wide,
          height: 22,
          radius: 4,
        },
        glyph: { x: node.x + (left ? 11 + words : width - 11 - words), y: node.y + row.y },
      }
    }
    case 'load':
      return at(
        { x: 12, y: -3, width: width - 24, height: height + 6 },
        node.style === 'lamp' || node.style === 'motor' ? 23 : 4,
      )
    default:
      return at({ x: -3, y: 0, width: width + 6, height }, 4)
  }
}

/** True for a place inside a part's box: its ring goes over the part, or the part would hide it. */
export function isInside(site: string): boolean {
  return site.startsWith('pin:') || (site.startsWith('part:') && site.includes('.'))
}

/** Band, rungs or thin ring round a cavity, contact or part; drawn under the part so that its ink stays whole. */
export function ringStrokes(mark: PlaceMark, verdict: VerdictMark): Primitive[] {
  if (!mark.ring) return []
  const ring = (
    grow: number,
    stroke: 'ink' | 'faulty-band' | 'question-band' | 'good-band',
    strokeWidth: number,
    dash?: string,
  ): Primitive => {
    const { x, y, width, height, radius } = mark.ring as Box & { radius: number }
    return {
      kind: 'rect',
      x: x - grow,
      y: y - grow,
      width: width + 2 * grow,
      height: height + 2 * grow,
      radius: radius + grow,
      fill: 'none',
      stroke,
      strokeWidth,
      ...(dash ? { dash } : {}),
    }
  }
  switch (verdict) {
    case 'faulty':
      return [ring(3, 'ink', 9), ring(3, 'faulty-band', 5)]
    case 'in-question':
      return [ring(3, 'question-band', 6, '3.2 4.2')]
    case 'proved-good':
      return [ring(1, 'good-band', 1.7)]
  }
}

/** The square a verdict's glyph covers. */
export function glyphBox(verdict: VerdictMark, { x, y }: Place): Box {
  const half = { faulty: 13, 'in-question': 11, 'proved-good': 8 }[verdict]
  return { x: x - half, y: y - half, width: 2 * half, height: 2 * half }
}

/** The verdict's glyph, centred: diamond with a cross or its letter, round with a question mark, bare tick. */
export function verdictGlyph(verdict: VerdictMark, { x, y }: Place, letter?: string): Primitive[] {
  switch (verdict) {
    case 'faulty':
      return [
        {
          ...inkPath(
            `M${x} ${y - 12}L${x + 12} ${y}L${x} ${y + 12}L${x - 12} ${y}Z`,
            undefined,
            'faulty-band',
          ),
          strokeWidth: 2,
        } as Primitive,
        letter
          ? {
              kind: 'text',
              x,
              y: y + 4.5,
              text: letter,
              size: 13,
              weight: 800,
              anchor: 'middle',
              fill: 'window',
            }
          : {
              kind: 'path',
              d: `M${x - 4} ${y - 4}L${x + 4} ${y + 4}M${x + 4} ${y - 4}L${x - 4} ${y + 4}`,
              stroke: 'window',
              strokeWidth: 2.4,
              cap: 'round',
            },
      ]
    case 'in-question':
      return [
        { kind: 'circle', cx: x, cy: y, r: 10, fill: 'sheet', stroke: 'question-band', strokeWidth: 2.2 },
        {
          kind: 'path',
          d: `M${x - 3.4} ${y - 2.6}A3.5 3.5 0 1 1 ${x + 0.6} ${y + 0.7}Q${x} ${y + 1.2} ${x} ${y + 2.6}M${x} ${y + 5.6}V${y + 5.8}`,
          fill: 'none',
          stroke: 'question',
          strokeWidth: 2,
          cap: 'round',
        },
      ]
    case 'proved-good':
      return [
        {
          kind: 'path',
          d: `M${x - 6} ${y}L${x - 2} ${y + 4.5}L${x + 6.5} ${y - 5}`,
          fill: 'none',
          stroke: 'good',
          strokeWidth: 2.4,
          cap: 'round',
        },
      ]
  }
}
