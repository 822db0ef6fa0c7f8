import { describe, expect, it } from 'vitest'
import { connectorFace } from '@/diagrams/drawing/connector-face'

/** Numbers as one reads them off the face, row by row. */
function rowsOf(face: ReturnType<typeof connectorFace>): number[][] {
  const rows = new Map<number, { x: number; number: number }[]>()
  for (const { x, y, number } of face.cavities) rows.set(y, [...(rows.get(y) ?? []), { x, number }])
  return [...rows]
    .toSorted(([one], [other]) => one - other)
    .map(([, row]) => row.toSorted((one, other) => one.x - other.x).map((cavity) => cavity.number))
}

describe('connector face', () => {
  it('counts row by row', () => {
    expect(rowsOf(connectorFace({ cavities: 6, rows: 2, numbering: 'rows' }))).toEqual([
      [1, 2, 3],
      [4, 5, 6],
    ])
  })

  it('counts to and fro', () => {
    expect(rowsOf(connectorFace({ cavities: 6, rows: 2, numbering: 'snake' }))).toEqual([
      [1, 2, 3],
      [6, 5, 4],
    ])
  })

  it('counts column by column', () => {
    expect(rowsOf(connectorFace({ cavities: 6, rows: 2, numbering: 'columns' }))).toEqual([
      [1, 3, 5],
      [2, 4, 6],
    ])
  })

  it('leaves the last row short where the cavities do not fill it', () => {
    expect(rowsOf(connectorFace({ cavities: 5, rows: 2, numbering: 'rows' }))).toEqual([
      [1, 2, 3],
      [4, 5],
    ])
  })

  it('ends at the highest cavity in use where the document does not say how many there are', () => {
    expect(rowsOf(connectorFace({ cavities: null, rows: 1, numbering: 'rows' }, 4))).toEqual([[1, 2, 3, 4]])
  })
})
