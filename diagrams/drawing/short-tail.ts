import type { Circuit } from '../document/circuit-schema'
import type { ShortTail } from './overlay'
import { textBox } from './part-label'
import type { Box, Place, Primitive } from './primitive'
import { inkLine, inkPath, ink } from './symbol-pen'
import { alongRoute, routeLength } from './wire-path'
import { wireRoute } from './wire-route'

/** A short as a heavy dashed tail from the wire's middle to a ground, a feed or the other wire, labelled. */
export function shortTail(circuit: Circuit, tail: ShortTail): Primitive[] {
  const middle = middleOf(circuit, tail.wire)
  if (!middle) return []
  const dashed = (to: Place): Primitive => ({
    kind: 'path',
    d: `M${middle.x} ${middle.y}V${to.y}H${to.x}`,
    fill: 'none',
    stroke: 'faulty-band',
    strokeWidth: 5,
    dash: '9 6',
  })
  if (typeof tail.to === 'object') {
    const other = middleOf(circuit, tail.to.wire)
    if (!other) return []
    return [dashed(other), ink(middle.x + 14, (middle.y + other.y) / 2 + 5, tail.label, 'start')]
  }
  if (tail.to === 'ground') {
    const { x } = middle
    const y = middle.y + 52
    return [
      dashed({ x, y }),
      inkLine(x - 16, y, x + 16, y),
      inkLine(x - 10, y + 7, x + 10, y + 7),
      inkLine(x - 4, y + 14, x + 4, y + 14),
      ink(x + 22, y + 12, tail.label, 'start'),
    ]
  }
  const { x } = middle
  const y = middle.y - 52
  return [
    dashed({ x, y }),
    inkPath(`M${x - 14} ${y - 26}H${x + 14}V${y - 12}L${x} ${y}L${x - 14} ${y - 12}Z`),
    ink(x + 20, y - 10, tail.label, 'start'),
  ]
}

/** What a tail's words cover, for whatever gives way to them. */
export function shortTailBoxes(circuit: Circuit, tails: readonly ShortTail[]): Box[] {
  return tails.flatMap((tail) =>
    shortTail(circuit, tail).flatMap((one) => (one.kind === 'text' ? [textBox(one)] : [])),
  )
}

function middleOf(circuit: Circuit, id: string): Place | null {
  const wire = circuit.wires.find((one) => one.id === id)
  if (!wire) return null
  const route = wireRoute(circuit, wire)
  return alongRoute(route, routeLength(route) / 2)?.at ?? null
}
