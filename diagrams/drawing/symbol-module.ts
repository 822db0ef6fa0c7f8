import type { NodeOf } from '../document/node-schema'
import { moduleLayout } from './module-layout'
import type { Primitive } from './primitive'
import { ink, inkPath, note } from './symbol-pen'

/** An open box with one torn edge: what is inside goes on. One row per pin: number, name, what stands behind it. */
export function moduleSymbol(node: NodeOf<'module'>): Primitive[] {
  const layout = moduleLayout(node)
  const { width, height } = layout
  return [
    inkPath(outline(width, height, layout.torn)),
    ...layout.rows.flatMap((row): Primitive[] => {
      const left = row.side === 'left'
      const anchor = left ? 'start' : 'end'
      const numberX = left ? 16 : width - 16
      const nameX = left ? numberX + 8.4 * row.pin.pin.length + 9 : numberX - 8.4 * row.pin.pin.length - 9
      const number: Primitive = { ...ink(numberX, row.y + 5, row.pin.pin, anchor), size: 14 }
      const name = row.pin.name || row.circuit
      const second = row.pin.name && !row.pin.name.toLowerCase().includes(row.circuit) ? row.circuit : ''
      if (!second) return [number, note(nameX, row.y + 5, name, anchor)]
      return [
        number,
        note(nameX, row.y - 2, name, anchor),
        { ...note(nameX, row.y + 13, second, anchor), fill: 'ink-3', weight: 500 },
      ]
    }),
  ]
}

function outline(width: number, height: number, torn: 'left' | 'right' | 'bottom'): string {
  const steps = Math.max(2, Math.round((torn === 'bottom' ? width : height) / 14))
  const long = (torn === 'bottom' ? width : height) / steps
  const zigzag = (at: number) => (at % 2 === 1 ? 9 : 0)
  if (torn === 'bottom') {
    let d = `M${width} ${height}V0H0V${height}`
    for (let at = 1; at <= steps; at++) d += `L${round(at * long)} ${height + (at < steps ? zigzag(at) : 0)}`
    return d
  }
  const outX = torn === 'right' ? width : 0
  const inX = torn === 'right' ? 0 : width
  const way = torn === 'right' ? -1 : 1
  let d = `M${outX} ${height}H${inX}V0H${outX}`
  for (let at = 1; at <= steps; at++)
    d += `L${outX + (at < steps ? way * zigzag(at) : 0)} ${round(at * long)}`
  return d
}

function round(value: number): number {
  return Math.round(value * 10) / 10
}
