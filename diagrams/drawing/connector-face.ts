import type { Connector } from '../document/circuit-schema'
import type { Box } from './primitive'

export interface FaceCavity extends Box {
  number: number
}

export interface ConnectorFace {
  width: number
  height: number
  cavities: FaceCavity[]
}

/** How a face is counted, in words: a cavity is only found by someone who knows. */
export const numberingWords: Readonly<Record<Connector['numbering'], string>> = {
  rows: 'counted row by row, left to right',
  snake: 'counted to and fro, every other row backwards',
  columns: 'counted column by column, top to bottom',
}

/**
 * The cavities of a connector as rectangles, seen from the wire side. Where the document does not state how many
 * there are, the face ends at `highestUsed`.
 */
export function connectorFace(
  connector: Pick<Connector, 'cavities' | 'rows' | 'numbering'>,
  highestUsed = 1,
  cell = { width: 26, height: 24, gap: 4 },
): ConnectorFace {
  const count = connector.cavities ?? Math.max(1, highestUsed)
  const rows = Math.min(connector.rows, count)
  const columns = Math.ceil(count / rows)
  const cavities = Array.from({ length: count }, (_, at): FaceCavity => {
    const row = connector.numbering === 'columns' ? at % rows : Math.floor(at / columns)
    const along = connector.numbering === 'columns' ? Math.floor(at / rows) : at % columns
    const column = connector.numbering === 'snake' && row % 2 === 1 ? columns - 1 - along : along
    return {
      number: at + 1,
      x: cell.gap + column * (cell.width + cell.gap),
      y: cell.gap + row * (cell.height + cell.gap),
      width: cell.width,
      height: cell.height,
    }
  })
  return {
    width: cell.gap + columns * (cell.width + cell.gap),
    height: cell.gap + rows * (cell.height + cell.gap),
    cavities,
  }
}
