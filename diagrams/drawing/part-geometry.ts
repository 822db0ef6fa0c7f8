import type { Node } from '../document/node-schema'
import { portsOf } from '../document/ports'
import { moduleLayout } from './module-layout'
import { switchLayout } from './switch-layout'

/** The side of a part on which a wire leaves; `any` for a joint that wires reach from everywhere. */
export type Side = 'left' | 'right' | 'top' | 'bottom' | 'any'

export interface PortPlace {
  x: number
  y: number
  side: Side
}

export const gridPixels = 20
export const relaySize = { width: 120, height: 160 }
/** Sixteen cavities in two rows of eight, 40 px apart so that wires from neighbours keep their distance. */
export const dlcSize = { width: 360, height: 100 }

/** Size of a part in pixels at 100 %, its label left out: the label stands outside. */
export function partBox(node: Node): { width: number; height: number } {
  switch (node.kind) {
    case 'battery':
    case 'feed':
    case 'fuse':
    case 'cavity':
      return { width: 60, height: 40 }
    case 'ground':
    case 'splice':
      return { width: 40, height: 40 }
    case 'load':
    case 'resistor':
    case 'diode':
      return { width: 80, height: 40 }
    case 'relay':
      return relaySize
    case 'switch':
      return switchLayout(node)
    case 'module':
      return moduleLayout(node)
    case 'dlc':
      return dlcSize
  }
}

/**
 * Where a wire lands, from the part's top left corner, on the 20 px grid of the drawing. Current goes in at the
 * left and out at the right wherever a part allows it, so that a drawing reads from feed to ground.
 */
export function portPlace(node: Node, port: string): PortPlace {
  const { width } = partBox(node)
  const left = (y: number): PortPlace => ({ x: 0, y, side: 'left' })
  const right = (y: number): PortPlace => ({ x: width, y, side: 'right' })
  switch (node.kind) {
    case 'battery':
      return port === 'pos' ? right(20) : { x: 20, y: 40, side: 'bottom' }
    case 'feed':
      return right(20)
    case 'ground':
      return { x: 20, y: 0, side: 'top' }
    case 'fuse':
      return port === 'in' ? left(20) : right(20)
    case 'splice':
      return { x: 20, y: 20, side: 'any' }
    case 'cavity':
    case 'load':
    case 'resistor':
      return port === 'a' ? left(20) : right(20)
    case 'diode':
      return port === 'anode' ? left(20) : right(20)
    case 'relay':
      return relayPort(port)
    case 'switch': {
      const found = switchLayout(node).ports.find((one) => one.name === port)
      return found ? { x: found.side === 'left' ? 0 : width, y: found.y, side: found.side } : left(40)
    }
    case 'module': {
      const found = moduleLayout(node).rows.find((one) => one.pin.pin === port)
      return found ? { x: found.side === 'left' ? 0 : width, y: found.y, side: found.side } : left(20)
    }
    case 'dlc': {
      const number = Number(port)
      const column = (number - 1) % 8
      return {
        x: 40 + 40 * column,
        y: number <= 8 ? 0 : dlcSize.height,
        side: number <= 8 ? 'top' : 'bottom',
      }
    }
  }
}

function relayPort(port: string): PortPlace {
  switch (port) {
    case '86':
      return { x: 0, y: 40, side: 'left' }
    case '85':
      return { x: relaySize.width, y: 40, side: 'right' }
    case '30':
      return { x: 0, y: 120, side: 'left' }
    case '87a':
      return { x: relaySize.width, y: 80, side: 'right' }
    default:
      return { x: relaySize.width, y: 120, side: 'right' }
  }
}

/** A port in the coordinates of the sheet; null when the end does not exist. */
export function endPlace(nodes: ReadonlyMap<string, Node>, end: string): PortPlace | null {
  const dot = end.indexOf('.')
  const node = nodes.get(end.slice(0, dot))
  const port = end.slice(dot + 1)
  if (!node || !portsOf(node).some((one) => one.name === port)) return null
  const place = portPlace(node, port)
  return { x: node.x + place.x, y: node.y + place.y, side: place.side }
}

const known = new WeakMap<readonly Node[], Map<string, Node>>()

/** Parts by id. Kept for as long as the list lives: a drawing asks once a wire, and documents are never changed in place. */
export function nodesById(nodes: readonly Node[]): ReadonlyMap<string, Node> {
  const before = known.get(nodes)
  if (before) return before
  const byId = new Map(nodes.map((node) => [node.id, node]))
  known.set(nodes, byId)
  return byId
}
