import type { NodeOf } from '../document/node-schema'
import type { PartState } from './part-state'
import { inkWidth, type Primitive } from './primitive'
import { inkLine, inkPath, inkRound, note } from './symbol-pen'
import { switchLayout, type SwitchPort } from './switch-layout'

const pivotX = 38
const fixedX = 82

/** One blade per contact between two small rounds, or one blade that changes over between several. */
export function switchSymbol(node: NodeOf<'switch'>, state: PartState): Primitive[] {
  const layout = switchLayout(node)
  const out: Primitive[] = [
    {
      kind: 'rect',
      x: 0,
      y: 0,
      width: layout.width,
      height: layout.height,
      fill: 'sheet',
      stroke: 'ink',
      strokeWidth: inkWidth,
    },
  ]
  const port = (name: string) => layout.ports.find((one) => one.name === name) as SwitchPort
  const pivotOf = (index: number): SwitchPort => {
    const { a, b } = (layout.contacts[index] as (typeof layout.contacts)[number]).contact
    return port(a).rows.length === 1 && port(b).rows.length > 1 ? port(b) : port(a)
  }
  const groups = new Map<string, number[]>()
  layout.contacts.forEach((_, index) => {
    const pivot = pivotOf(index).name
    groups.set(pivot, [...(groups.get(pivot) ?? []), index])
  })
  const blades: { x: number; y: number; control: string | null }[] = []
  for (const [name, members] of groups) {
    const pivot = port(name)
    const [from, to] = pivot.side === 'left' ? [pivotX, fixedX] : [fixedX, pivotX]
    const push = members.some((at) => isPush(layout.contacts[at]?.contact.closed))
    for (const at of members) {
      const { contact, y } = layout.contacts[at] as (typeof layout.contacts)[number]
      out.push(...fixedLead(port(contact.a === name ? contact.b : contact.a), to, y))
      out.push(inkRound(to, y, 3.6))
      if (state.closed.has(contact.id)) {
        const [nearX, nearY] = shorten(from, pivot.y, to, y, 3.6)
        out.push(inkLine(from, pivot.y, nearX, nearY))
        blades.push(blade(from, pivot.y, to, y, contact.closed))
      }
    }
    if (
      !members.some((at) => state.closed.has((layout.contacts[at] as { contact: { id: string } }).contact.id))
    ) {
      // Nothing closed: the blade stands clear of every fixed contact.
      const lone = members.length === 1
      const tipY = pivot.y - (lone ? (push ? 8 : 17) : 0)
      const tipX = lone ? to - Math.sign(to - from) * 3 : to - Math.sign(to - from) * 12
      out.push(
        inkLine(
          from,
          pivot.y - (lone && push ? 8 : 0),
          tipX + (lone && push ? Math.sign(to - from) * 3 : 0),
          tipY,
        ),
      )
      const first = layout.contacts[members[0] as number] as (typeof layout.contacts)[number]
      blades.push(blade(from, pivot.y - (lone ? (push ? 8 : 9) : 0), tipX, tipY, first.contact.closed))
    }
    out.push(inkLine(pivot.side === 'left' ? 0 : layout.width, pivot.y, from, pivot.y))
    out.push(inkRound(from, pivot.y, 3.6))
    if (push && members.length === 1) {
      const closed = members.some((at) =>
        state.closed.has((layout.contacts[at] as { contact: { id: string } }).contact.id),
      )
      const barY = pivot.y - (closed ? 0 : 8)
      out.push(inkLine(60, barY, 60, barY - 18), inkLine(50, barY - 18, 70, barY - 18))
    }
  }
  return [...out, ...ties(blades), ...portNames(layout.ports, layout.width, layout.ports.length > 2)]
}

function blade(x1: number, y1: number, x2: number, y2: number, closed: unknown) {
  const control =
    typeof closed === 'object' && closed !== null && 'control' in closed ? String(closed.control) : null
  return { x: (x1 + x2) / 2, y: (y1 + y2) / 2, control }
}

/** Dashed line between blades that one control moves together. */
function ties(blades: { x: number; y: number; control: string | null }[]): Primitive[] {
  return blades.flatMap((one, at): Primitive[] => {
    const next = blades.slice(at + 1).find((other) => other.control !== null && other.control === one.control)
    return next
      ? [
          {
            kind: 'line',
            x1: 60,
            y1: one.y,
            x2: 60,
            y2: next.y,
            stroke: 'ink',
            strokeWidth: 1.6,
            dash: '5 4',
          },
        ]
      : []
  })
}

/** From a port to the fixed round of one row; a port of several rows gets an upright rail inside the box. */
function fixedLead(port: SwitchPort, x: number, y: number): Primitive[] {
  const edge = port.side === 'left' ? 0 : 120
  if (port.y === y) return [inkLine(edge, y, x, y)]
  const rail = port.side === 'left' ? 22 : 98
  return [inkPath(`M${edge} ${port.y}H${rail}V${y}H${x}`, undefined, 'none')]
}

function portNames(ports: SwitchPort[], width: number, all: boolean): Primitive[] {
  return ports.map((port) =>
    note(
      port.side === 'left' ? 6 : width - 6,
      port.y - (all ? 6 : 7),
      port.name,
      port.side === 'left' ? 'start' : 'end',
    ),
  )
}

function shorten(x1: number, y1: number, x2: number, y2: number, by: number): [number, number] {
  const long = Math.hypot(x2 - x1, y2 - y1)
  return [x2 - ((x2 - x1) / long) * by, y2 - ((y2 - y1) / long) * by]
}

/** A push switch is one whose contact closes while something is held or pressed. */
function isPush(closed: unknown): boolean {
  return (
    typeof closed === 'object' &&
    closed !== null &&
    'positions' in closed &&
    Array.isArray(closed.positions) &&
    closed.positions.some((position) => /held|press|push/i.test(String(position)))
  )
}
