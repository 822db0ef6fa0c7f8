import type { NodeOf } from '../document/node-schema'
import type { ModulePin, PinCircuit } from '../document/pin-circuit-schema'
import { textWidth } from './primitive'

export interface ModuleRow {
  pin: ModulePin
  side: 'left' | 'right'
  y: number
  /** What stands behind the pin, in a few words. */
  circuit: string
}

export interface ModuleLayout {
  width: number
  height: number
  rows: ModuleRow[]
  /** The edge drawn torn: where no wire lands. */
  torn: 'left' | 'right' | 'bottom'
}

const rowPixels = 40
const numberSize = 14
const nameSize = 13

/**
 * A pin that takes current in stands at the left, one that gives it out at the right: supplies, low-side drivers
 * and pull-downs left, grounds, high-side drivers, sources and pull-ups right. A bridge stands with its other end.
 */
export function moduleLayout(node: NodeOf<'module'>): ModuleLayout {
  const next = { left: 0, right: 0 }
  const rows = node.pins.map((pin): ModuleRow => {
    const side = sideOf(node, pin)
    return { pin, side, y: 20 + rowPixels * next[side]++, circuit: circuitWords(pin.circuit) }
  })
  const widest = (side: 'left' | 'right') =>
    Math.max(0, ...rows.filter((row) => row.side === side).map((row) => rowWidth(row)))
  const both = next.left > 0 && next.right > 0
  const content = widest('left') + widest('right') + (both ? 52 : 72)
  return {
    width: Math.max(120, Math.ceil(content / 20) * 20),
    height: rowPixels * Math.max(next.left, next.right) + (both ? 10 : 0),
    rows,
    torn: both ? 'bottom' : next.right > 0 ? 'left' : 'right',
  }
}

function rowWidth(row: ModuleRow): number {
  return (
    textWidth(row.pin.pin, numberSize) +
    8 +
    Math.max(textWidth(row.pin.name, nameSize), textWidth(row.circuit, 13))
  )
}

function sideOf(node: NodeOf<'module'>, pin: ModulePin): 'left' | 'right' {
  const circuit = pin.circuit
  switch (circuit.type) {
    case 'supply':
    case 'pull-down':
    case 'low-side':
    case 'none':
      return 'left'
    case 'bridge': {
      const other = node.pins.find((one) => one.pin === circuit.to)
      return other && other.circuit.type !== 'bridge' ? sideOf(node, other) : 'right'
    }
    default:
      return 'right'
  }
}

function circuitWords(circuit: PinCircuit): string {
  switch (circuit.type) {
    case 'pull-up':
      return `pull-up ${circuit.volts} V`
    case 'source':
      return `gives ${circuit.volts} V`
    case 'bridge':
      return `${circuit.ohms} ohm to ${circuit.to}`
    case 'none':
      return ''
    case 'supply':
      return 'supply'
    case 'ground':
      return 'ground'
    case 'pull-down':
      return 'pull-down'
    case 'low-side':
      return 'drives low'
    case 'high-side':
      return 'drives high'
  }
}
