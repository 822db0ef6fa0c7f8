import type { Circuit, Connector } from '../document/circuit-schema'
import type { NodeOf } from '../document/node-schema'
import { connectorName } from '../document/points'
import type { Box, Primitive } from './primitive'
import { ink } from './symbol-pen'

export interface ConnectorOutline {
  connector: Connector
  box: Box
  primitives: Primitive[]
}

/** A dashed outline round the inline cavities of one connector, its name under it, in sheet coordinates. */
export function connectorOutlines(circuit: Circuit): ConnectorOutline[] {
  return circuit.connectors.flatMap((connector): ConnectorOutline[] => {
    const cavities = circuit.nodes.filter(
      (node): node is NodeOf<'cavity'> => node.kind === 'cavity' && node.connector === connector.id,
    )
    if (cavities.length === 0) return []
    const left = Math.min(...cavities.map((node) => node.x)) - 14
    const right = Math.max(...cavities.map((node) => node.x + 60)) + 14
    const top = Math.min(...cavities.map((node) => node.y)) - 12
    const bottom = Math.max(...cavities.map((node) => node.y + 40)) + 12
    const box = { x: left, y: top, width: right - left, height: bottom - top }
    return [
      {
        connector,
        box,
        primitives: [
          { kind: 'rect', ...box, radius: 8, fill: 'none', stroke: 'edge', strokeWidth: 1.8, dash: '7 5' },
          ink((left + right) / 2, bottom + 17, connectorName(connector), 'middle'),
        ],
      },
    ]
  })
}
