'use client'

import type { Circuit, Connector } from '@/diagrams/document/circuit-schema'
import { connectorName } from '@/diagrams/document/points'
import { portsOf } from '@/diagrams/document/ports'
import { connectorFace, numberingWords } from '@/diagrams/drawing/connector-face'

const marginPixels = 5
const tab = { width: 34, height: 8 }

/** The face of a connector from its wire side, one cavity picked, and how it is counted for who cannot see it. */
export function ConnectorFace({
  circuit,
  connector,
  cavity,
  width,
}: {
  circuit: Circuit
  connector: Connector
  cavity: number
  width: number
}) {
  const highest = Math.max(
    cavity,
    ...circuit.nodes.flatMap((node) =>
      portsOf(node).flatMap((port) =>
        port.connector === connector.id && port.cavity !== null ? [port.cavity] : [],
      ),
    ),
  )
  const face = connectorFace(connector, highest)
  const whole = { width: face.width + 2 * marginPixels, height: face.height + 2 * marginPixels + tab.height }
  // Faces with many cavities take more room before their numbers become too small to read.
  const shown = Math.min(Math.max(width, face.cavities.length * 5), whole.width, 2 * width)
  return (
    <figure className="flex-none self-start">
      <svg
        width={shown}
        height={(shown / whole.width) * whole.height}
        viewBox={`${-marginPixels} ${-marginPixels - tab.height} ${whole.width} ${whole.height}`}
        role="img"
        aria-label={`Face of ${connectorName(connector)}, wire side, ${numberingWords[connector.numbering]}, cavity ${cavity} marked`}
      >
        <path
          d={`M0 0H${(face.width - tab.width) / 2}V${-tab.height}H${(face.width + tab.width) / 2}V0H${face.width}V${face.height}H0Z`}
          style={{ fill: 'var(--panel)', stroke: 'var(--ink)', strokeWidth: 2.2 }}
        />
        {face.cavities.map((one) => {
          const picked = one.number === cavity
          return (
            <g key={one.number}>
              <rect
                x={one.x}
                y={one.y}
                width={one.width}
                height={one.height}
                style={{
                  fill: picked ? 'var(--ink)' : 'var(--window)',
                  stroke: 'var(--ink)',
                  strokeWidth: picked ? 2.4 : 1.4,
                }}
              />
              <text
                x={one.x + one.width / 2}
                y={one.y + one.height / 2 + 5}
                textAnchor="middle"
                style={{
                  fill: picked ? 'var(--on-ink)' : 'var(--ink-3)',
                  fontSize: '13.5px',
                  fontWeight: 700,
                  fontFamily: 'var(--font-text)',
                }}
              >
                {one.number}
              </text>
            </g>
          )
        })}
      </svg>
    </figure>
  )
}
