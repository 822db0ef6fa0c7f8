import type { Circuit } from '@/diagrams/document/circuit-schema'
import { parsePoint } from '@/diagrams/document/points'
import { labelObstacles } from '@/diagrams/drawing/drawn-wires'
import { endPlace, nodesById, partBox } from '@/diagrams/drawing/part-geometry'
import { type Box, boxesMeet, type Place, textWidth } from '@/diagrams/drawing/primitive'
import { alongRoute, routeLength } from '@/diagrams/drawing/wire-path'
import { wireRoute } from '@/diagrams/drawing/wire-route'

export type FlagLook = 'reading' | 'doubted' | 'next' | 'volts' | 'red-lead' | 'black-lead'

/** A plate wanted on the sheet, and what it points at. */
export interface FlagWish {
  id: string
  look: FlagLook
  /** "R3", or nothing. */
  number: string
  /** "0.00 V", "Next: red lead", "12.1". */
  text: string
  target: { point: string } | { wire: string } | { node: string }
}

export interface Flag extends FlagWish {
  box: Box
  /** Where the pointer ends. */
  tip: Place
  /** Size against 100 %, so that a flag stays readable when the sheet is small. */
  scale: number
}

/**
 * Places for flags and plates: beside what they point at, clear of each other, of parts and of verdict glyphs where
 * there is room. The ones wished first choose first.
 */
export function layFlags(
  circuit: Circuit,
  wishes: readonly FlagWish[],
  marks: readonly { glyph: Place }[],
  scale = 1,
): Flag[] {
  const parts = labelObstacles(circuit)
  const runs = circuit.wires.flatMap((wire) => {
    const route = wireRoute(circuit, wire)
    return route.slice(1).map((to, at) => spanBox(route[at] as Place, to))
  })
  const glyphs = marks.map(({ glyph }) => ({ x: glyph.x - 11, y: glyph.y - 11, width: 22, height: 22 }))
  const placed: Flag[] = []
  for (const wish of wishes) {
    const target = targetPlace(circuit, wish.target)
    if (!target) continue
    const size = flagSize(wish, scale)
    let best: { box: Box; cost: number } | null = null
    for (const [rank, box] of candidates(target, size, wish.look, scale).entries()) {
      const cost =
        rank * 14 +
        sum(placed, (flag) => 6 * overlap(box, flag.box)) +
        sum(parts, (part) => overlap(box, part)) +
        sum(glyphs, (glyph) => 1.5 * overlap(box, glyph)) +
        sum(runs, (run) => 0.7 * overlap(box, run))
      if (best === null || cost < best.cost) best = { box, cost }
    }
    if (best) placed.push({ ...wish, box: best.box, tip: target.at, scale })
  }
  return placed
}

export function flagSize(wish: FlagWish, scale = 1): { width: number; height: number } {
  const height = wish.look === 'volts' ? 24 : 28
  const number = wish.number === '' ? 0 : textWidth(wish.number, 14, true) + 10
  const mono = wish.look !== 'next'
  const width = number + textWidth(wish.text, 14, mono) + 18
  return { width: Math.round(width * scale), height: Math.round(height * scale) }
}

interface Target {
  at: Place
  /** The way the wire leaves, so that a plate prefers the wire's side of the part. */
  out: 'left' | 'right' | 'up' | 'down' | 'none'
}

/** Where a lead, a clamp or an eye is on the sheet; null for chassis and for what the circuit does not have. */
export function targetPlace(circuit: Circuit, target: FlagWish['target']): Target | null {
  if ('wire' in target) {
    const wire = circuit.wires.find((one) => one.id === target.wire)
    if (!wire) return null
    const route = wireRoute(circuit, wire)
    const middle = alongRoute(route, routeLength(route) / 2)
    return middle ? { at: middle.at, out: 'none' } : null
  }
  if ('node' in target) {
    const node = circuit.nodes.find((one) => one.id === target.node)
    if (!node) return null
    const { width } = partBox(node)
    return { at: { x: node.x + width / 2, y: node.y }, out: 'none' }
  }
  const place = pointPlace(circuit, target.point)
  return place
}

/** A point of the sheet. The part's side of a contact lies inside the part's edge, the harness side outside. */
export function pointPlace(circuit: Circuit, point: string): Target | null {
  const parsed = parsePoint(point)
  if (!parsed) return null
  const port = endPlace(nodesById(circuit.nodes), `${parsed.node}.${parsed.port}`)
  if (!port) return null
  const [x, y] =
    port.side === 'left'
      ? [-1, 0]
      : port.side === 'right'
        ? [1, 0]
        : port.side === 'top'
          ? [0, -1]
          : port.side === 'bottom'
            ? [0, 1]
            : [0, 0]
  const by = parsed.part ? -8 : 0
  const out = x < 0 ? 'left' : x > 0 ? 'right' : y < 0 ? 'up' : y > 0 ? 'down' : 'none'
  return { at: { x: port.x + x * by, y: port.y + y * by }, out }
}

function candidates(
  { at, out }: Target,
  { width, height }: { width: number; height: number },
  look: FlagLook,
  scale: number,
): Box[] {
  const near = (look === 'volts' ? 9 : 14) * scale
  const side = out === 'left' ? -1 : out === 'right' ? 1 : 0
  const lefts =
    side < 0
      ? [-width + 6, -width / 2, -width - 10, -12, 10]
      : side > 0
        ? [-6, -width / 2, 10, -width + 12, -width - 10]
        : [-width / 2, 8, -width - 8, -width + 10, -10]
  const boxes: Box[] = []
  for (const distance of [near, near + 18 * scale, near + 40 * scale])
    for (const left of lefts) {
      boxes.push({ x: at.x + left, y: at.y + distance, width, height })
      boxes.push({ x: at.x + left, y: at.y - distance - height, width, height })
    }
  return boxes
}

function spanBox(from: Place, to: Place): Box {
  return {
    x: Math.min(from.x, to.x) - 5,
    y: Math.min(from.y, to.y) - 5,
    width: Math.abs(from.x - to.x) + 10,
    height: Math.abs(from.y - to.y) + 10,
  }
}

function overlap(one: Box, other: Box): number {
  if (!boxesMeet(one, other)) return 0
  const width = Math.min(one.x + one.width, other.x + other.width) - Math.max(one.x, other.x)
  const height = Math.min(one.y + one.height, other.y + other.height) - Math.max(one.y, other.y)
  return width * height
}

function sum<T>(list: readonly T[], of: (one: T) => number): number {
  return list.reduce((total, one) => total + of(one), 0)
}
