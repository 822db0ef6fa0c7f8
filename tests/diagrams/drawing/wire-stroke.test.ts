import { describe, expect, it } from 'vitest'
import { bandStrokes, contrast, wireStrokes, wireWidth } from '@/diagrams/drawing/wire-stroke'
import { readWireColour, wireColourName, wireColours } from '@/diagrams/tables/wire-colours'

describe('wire colours', () => {
  it('are the fourteen letter codes of IEC 60757 without the combination', () => {
    expect(wireColours.map((colour) => colour.code).join(' ')).toBe(
      'BK BN RD OG YE GN BU VT GY WH PK TQ GD SR',
    )
  })

  it('read base and stripe, and green-yellow as green with a yellow stripe', () => {
    expect(wireColourName('rd/wh')).toBe('red with a white stripe')
    expect(wireColourName('GNYE')).toBe('green with a yellow stripe')
    expect(wireColourName('BU')).toBe('blue')
  })

  it('claim no colour for letters of no table', () => {
    for (const text of ['', 'XX', 'RD/XX', '"><script>']) expect(readWireColour(text), text).toBeNull()
  })

  it('keep every insulation apart from the sheet by a hairline edge', () => {
    expect(wireStrokes({ colour: 'WH', mm2: 1 })[0]).toEqual({ stroke: 'wire-edge', width: 6.8, cap: 'butt' })
  })
})

describe('wire strokes', () => {
  it('grow with the cross-section in the six steps of the drawing rules', () => {
    expect([0.35, 0.5, 0.75, 1, 1.5, 2.5, 4, 6, 10].map(wireWidth)).toEqual([4, 4, 5, 5, 6, 7, 9, 9, 11])
  })

  it('stripe with 38 % of the width, and wider where base and stripe look alike', () => {
    expect(wireStrokes({ colour: 'BU/WH', mm2: 0.75 }).at(-1)).toMatchObject({ width: 1.9, dash: '13 5' })
    expect(contrast('#D2202B', '#1F8C3F')).toBeLessThan(1.8)
    expect(wireStrokes({ colour: 'RD/GN', mm2: 0.75 }).at(-1)).toMatchObject({ width: 2.8, dash: '10 8' })
  })

  it('stack the bands of a verdict under a gap in sheet colour', () => {
    expect(bandStrokes(5, 'faulty').map(({ stroke, width }) => [stroke, width])).toEqual([
      ['ink', 27],
      ['faulty-band', 23],
      ['sheet', 11],
    ])
    expect(bandStrokes(5, 'in-question')[0]).toMatchObject({ width: 22, dash: '3.2 4.2' })
    expect(bandStrokes(5, 'proved-good').map((stroke) => stroke.width)).toEqual([13.4, 10.2])
    expect(bandStrokes(5, null)).toEqual([])
  })

  it('compute contrast as WCAG does: black on white is 21 to 1', () => {
    expect(contrast('#000000', '#FFFFFF')).toBeCloseTo(21, 6)
  })
})
