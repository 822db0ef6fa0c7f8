import type { Circuit, Wire } from '../document/circuit-schema'
import { endPlace, nodesById, type PortPlace, type Side } from './part-geometry'
import type { Place } from './primitive'

/** How far a wire leaves its port before it may turn. */
const stubPixels = 20

/**
 * The way of a wire over the sheet: level and upright runs from its `from` port through its bends to its `to` port.
 * Without bends it takes the shortest way that leaves and reaches both ports from their own sides. Empty when an
 * end does not exist.
 */
export function wireRoute(circuit: Circuit, wire: Wire): Place[] {
  const nodes = nodesById(circuit.nodes)
  const start = endPlace(nodes, wire.from)
  const end = endPlace(nodes, wire.to)
  if (!start || !end) return []
  return tidy(wire.bends.length > 0 ? throughBends(start, wire.bends, end) : direct(start, end))
}

function throughBends(start: PortPlace, bends: readonly Place[], end: PortPlace): Place[] {
  const stops: Place[] = [start, ...bends, end]
  const way: Place[] = [start]
  for (let at = 1; at < stops.length; at++) {
    const before = stops[at - 1] as Place
    const here = stops[at] as Place
    if (before.x !== here.x && before.y !== here.y) {
      const last = at === stops.length - 1
      // The first run follows the side of its port; the last one arrives along the side of its own.
      const levelFirst = at === 1 ? !isUpright(start.side) : last ? isUpright(end.side) : true
      way.push(levelFirst ? { x: here.x, y: before.y } : { x: before.x, y: here.y })
    }
    way.push(here)
  }
  return way
}

function direct(start: PortPlace, end: PortPlace): Place[] {
  if (start.x === end.x || start.y === end.y) {
    if (leaves(start, end) && leaves(end, start)) return [start, end]
  }
  const first = stub(start, end)
  const last = stub(end, start)
  const startUpright = isUpright(start.side)
  const endUpright = isUpright(end.side)
  if (start.side === 'any' || end.side === 'any' || startUpright !== endUpright) {
    const levelFirst = start.side === 'any' ? (end.side === 'any' ? true : endUpright) : !startUpright
    const corner = levelFirst ? { x: end.x, y: start.y } : { x: start.x, y: end.y }
    if (leaves(start, corner) && leaves(end, corner)) return [start, corner, end]
    const other = levelFirst ? { x: first.x, y: last.y } : { x: last.x, y: first.y }
    return [start, first, other, last, end]
  }
  if (startUpright) {
    const middle = roundTo(10, (start.y + end.y) / 2)
    if (leaves(start, { x: start.x, y: middle }) && leaves(end, { x: end.x, y: middle }))
      return [start, { x: start.x, y: middle }, { x: end.x, y: middle }, end]
    const aside = roundTo(10, (start.x + end.x) / 2)
    return [start, first, { x: aside, y: first.y }, { x: aside, y: last.y }, last, end]
  }
  const middle = roundTo(10, (start.x + end.x) / 2)
  if (leaves(start, { x: middle, y: start.y }) && leaves(end, { x: middle, y: end.y }))
    return [start, { x: middle, y: start.y }, { x: middle, y: end.y }, end]
  if (start.side === end.side) {
    const out = start.side === 'right' ? Math.max(first.x, last.x) : Math.min(first.x, last.x)
    return [start, { x: out, y: start.y }, { x: out, y: end.y }, end]
  }
  const between = start.y === end.y ? start.y + 3 * stubPixels : roundTo(10, (start.y + end.y) / 2)
  return [start, first, { x: first.x, y: between }, { x: last.x, y: between }, last, end]
}

/** True when going to `target` leaves a port through its own side. */
function leaves(port: PortPlace, target: Place): boolean {
  switch (port.side) {
    case 'left':
      return target.x < port.x && target.y === port.y
    case 'right':
      return target.x > port.x && target.y === port.y
    case 'bottom':
      return target.y > port.y && target.x === port.x
    // A ground's stem is reached from above or from either hand.
    case 'top':
      return target.y <= port.y
    case 'any':
      return true
  }
}

function stub(port: PortPlace, towards: Place): Place {
  switch (port.side) {
    case 'left':
      return { x: port.x - stubPixels, y: port.y }
    case 'right':
      return { x: port.x + stubPixels, y: port.y }
    case 'top':
      return { x: port.x, y: port.y - stubPixels }
    case 'bottom':
      return { x: port.x, y: port.y + stubPixels }
    case 'any':
      return { x: port.x + (towards.x < port.x ? -stubPixels : stubPixels), y: port.y }
  }
}

function isUpright(side: Side): boolean {
  return side === 'top' || side === 'bottom'
}

function roundTo(step: number, value: number): number {
  return Math.round(value / step) * step
}

/** Drops repeated places and places in the middle of a straight run. */
function tidy(way: readonly Place[]): Place[] {
  const kept: Place[] = []
  for (const { x, y } of way) {
    const last = kept.at(-1)
    const before = kept.at(-2)
    if (last && last.x === x && last.y === y) continue
    if (last && before && between(before, last, { x, y })) kept.pop()
    kept.push({ x, y })
  }
  return kept
}

function between(one: Place, middle: Place, other: Place): boolean {
  const inOrder = (a: number, b: number, c: number) => (a <= b && b <= c) || (a >= b && b >= c)
  return (
    (one.x === middle.x && middle.x === other.x && inOrder(one.y, middle.y, other.y)) ||
    (one.y === middle.y && middle.y === other.y && inOrder(one.x, middle.x, other.x))
  )
}
