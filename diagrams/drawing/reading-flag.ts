import type { Circuit } from '../document/circuit-schema'
import { parsePoint } from '../document/points'
import type { ReadingFlag } from './overlay'
import { endPlace, nodesById, partBox } from './part-geometry'
import { boxesMeet, grow, textWidth, type Box, type Place, type Primitive } from './primitive'
import { alongRoute, routeLength } from './wire-path'
import { wireRoute } from './wire-route'

export interface PlacedFlag {
  box: Box
  /** What its pointer covers. */
  pointer: Box
  primitives: Primitive[]
}

const flagHeight = 28

/** Where a flag's pointer ends on the sheet; null for chassis and for what does not exist. */
export function flagTarget(circuit: Circuit, at: string): Place | null {
  if (at.startsWith('wire:')) {
    const wire = circuit.wires.find((one) => one.id === at.slice(5))
    const route = wire ? wireRoute(circuit, wire) : []
    return alongRoute(route, routeLength(route) / 2)?.at ?? null
  }
  const nodes = nodesById(circuit.nodes)
  if (at.startsWith('node:')) {
    const node = nodes.get(at.slice(5))
    return node ? { x: node.x + partBox(node).width / 2, y: node.y + partBox(node).height / 2 } : null
  }
  const point = parsePoint(at)
  return point ? endPlace(nodes, `${point.node}.${point.port}`) : null
}

/** Flags on their points, each in the first spot around it that is free of `taken` and of the other flags. */
export function readingFlags(
  circuit: Circuit,
  flags: readonly ReadingFlag[],
  taken: readonly Box[],
): PlacedFlag[] {
  const placed: PlacedFlag[] = []
  for (const flag of flags) {
    const target = flagTarget(circuit, flag.at)
    if (!target) continue
    const width =
      textWidth(flag.number, 14) + textWidth(flag.value, 14, true) + (flag.number && flag.value ? 32 : 20)
    let best: { box: Box; cost: number } | null = null
    for (const box of spots(target, width)) {
      const inTheWay = (other: Box) => boxesMeet(box, other) || crosses(box, target, other)
      const cost =
        taken.filter(inTheWay).length +
        // A flag over another flag hides a figure: worse than anything else it might cover.
        10 * placed.filter((one) => inTheWay(grow(one.box, 3))).length
      if (!best || cost < best.cost) best = { box, cost }
      if (cost === 0) break
    }
    if (best)
      placed.push({
        box: best.box,
        pointer: pointerBox(best.box, target),
        primitives: drawFlag(flag, target, best.box),
      })
  }
  return placed
}

function spots({ x, y }: Place, width: number): Box[] {
  const box = (left: number, top: number): Box => ({ x: left, y: top, width, height: flagHeight })
  const levels = [y + 16, y - 16 - flagHeight, y + 44, y - 44 - flagHeight, y + 72, y - 72 - flagHeight]
  return levels.flatMap((top) => [box(x - width / 2, top), box(x - width + 14, top), box(x - 14, top)])
}

function pointerBox(flag: Box, target: Place): Box {
  const top = flag.y > target.y ? target.y : flag.y + flag.height
  const bottom = flag.y > target.y ? flag.y : target.y
  return { x: target.x - 3, y: top, width: 6, height: bottom - top }
}

/** Whether a flag's pointer runs over something that does not itself hold the point it points at. */
function crosses(flag: Box, target: Place, other: Box): boolean {
  const pointer = pointerBox(flag, target)
  return (
    boxesMeet(pointer, other) && !boxesMeet({ x: target.x - 1, y: target.y - 1, width: 2, height: 2 }, other)
  )
}

function drawFlag(flag: ReadingFlag, { x, y }: Place, box: Box): Primitive[] {
  const next = flag.style === 'next'
  const under = box.y > y
  const edge = under ? box.y : box.y + box.height
  const foot = Math.min(Math.max(x, box.x + 8), box.x + box.width - 8)
  const text = (at: number, words: string, mono: boolean): Primitive => ({
    kind: 'text',
    x: at,
    y: box.y + 19,
    text: words,
    size: 14,
    weight: 700,
    anchor: 'start',
    fill: next ? 'on-ink' : 'ink',
    mono,
  })
  return [
    {
      kind: 'path',
      d: `M${foot - 6} ${edge}L${x} ${y + (under ? 5 : -5)}L${foot + 6} ${edge}Z`,
      fill: 'ink',
    },
    {
      kind: 'rect',
      ...box,
      radius: 3,
      fill: next ? 'ink' : 'panel',
      stroke: 'ink',
      strokeWidth: 2,
      ...(flag.style === 'odd' ? { dash: '5 4' } : {}),
    },
    ...(flag.number ? [text(box.x + 10, flag.number, false)] : []),
    ...(flag.value
      ? [text(box.x + (flag.number ? 22 + textWidth(flag.number, 14) : 10), flag.value, true)]
      : []),
  ]
}
