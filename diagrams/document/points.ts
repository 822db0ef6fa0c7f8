import type { Circuit, Connector } from './circuit-schema'
import type { Node } from './node-schema'
import { hasContact, portsOf, splitEnd } from './ports'

export interface Point {
  node: string
  port: string
  /** True for `node.port:part`, the part's side of a contact. */
  part: boolean
}

/** `null` for chassis. */
export function parsePoint(text: string): Point | null {
  if (text === 'chassis') return null
  const part = text.endsWith(':part')
  return { ...splitEnd(part ? text.slice(0, -5) : text), part }
}

/** Every point a lead can reach in some condition, chassis left out. */
export function pointsOf(circuit: Circuit): string[] {
  return circuit.nodes.flatMap((node) =>
    portsOf(node).flatMap((port) => {
      const harness = `${node.id}.${port.name}`
      return hasContact(node, port) ? [harness, `${harness}:part`] : [harness]
    }),
  )
}

/** Label of a part as the drawing shows it. */
export function nodeName(node: Node): string {
  return node.label || node.id
}

export function connectorName(connector: Connector): string {
  return connector.label || connector.id
}

/**
 * A point in the trade's words: "C12 cavity 3, dash side", "K3 86", "Body module pin 12, unplugged part".
 * Unknown points come back as they are.
 */
export function pointName(circuit: Circuit, text: string): string {
  const point = parsePoint(text)
  if (!point) return 'chassis'
  const node = circuit.nodes.find((n) => n.id === point.node)
  if (!node) return text
  const tail = point.part ? ', part side' : ''
  switch (node.kind) {
    case 'cavity': {
      const connector = circuit.connectors.find((c) => c.id === node.connector)
      const side = (point.port === 'a' ? connector?.sides.a : connector?.sides.b) || `side ${point.port}`
      return `${connector ? connectorName(connector) : node.connector} cavity ${node.number}, ${side}`
    }
    case 'splice':
    case 'ground':
    case 'feed':
      return nodeName(node)
    case 'module':
      return `${nodeName(node)} pin ${point.port}${tail}`
    case 'dlc':
      return `${nodeName(node)} cavity ${point.port}${tail}`
    default:
      return `${nodeName(node)} ${point.port}${tail}`
  }
}
