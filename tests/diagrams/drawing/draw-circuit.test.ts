import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { sitesOf } from '@/diagrams/document/sites'
import { circuitPrimitives, drawCircuit } from '@/diagrams/drawing/draw-circuit'
import { tokens } from '@/diagrams/drawing/primitive'
import { placeMark } from '@/diagrams/drawing/verdict-mark'
import { samples } from '@/diagrams/samples/all-samples'
import { anyCircuit } from './random-circuit'

/** Enough of an XML reader to notice a tag that text has opened: names of all elements, with balance checked. */
function elementNames(svg: string): string[] {
  const open: string[] = []
  const names: string[] = []
  for (const [, close, name, , self] of svg.matchAll(
    /<(\/?)([a-zA-Z]+)((?:\s+[a-zA-Z0-9-]+="[^"<]*")*)\s*(\/?)>/g,
  )) {
    if (close) expect(open.pop()).toBe(name)
    else {
      names.push(name as string)
      if (!self) open.push(name as string)
    }
  }
  expect(open).toEqual([])
  expect(svg.replace(/<\/?[a-zA-Z]+(?:\s+[a-zA-Z0-9-]+="[^"<]*")*\s*\/?>/g, '')).not.toMatch(/[<>]/)
  return names
}

const known = new Set(['svg', 'title', 'text', 'path', 'circle', 'rect', 'line'])

describe('a circuit as SVG', () => {
  it('shows every name and every wire label of every sample as text', () => {
    for (const circuit of samples) {
      const svg = drawCircuit(circuit, { title: circuit.title })
      for (const node of circuit.nodes)
        if (node.kind !== 'cavity') expect(svg, `${circuit.title}: ${node.label}`).toContain(node.label)
      for (const wire of circuit.wires) expect(svg).toContain(`>${wire.colour} ${wire.mm2}<`)
      expect(elementNames(svg).every((name) => known.has(name))).toBe(true)
    }
  })

  it('keeps hostile text text, in every field that is drawn', () => {
    fc.assert(
      fc.property(fc.string({ maxLength: 40, unit: 'binary' }), (text) => {
        const hostile = `</text><script>alert(1)</script>"'&<![CDATA[${text}`
        const opened = openCircuit({
          format: 'halfsplit-circuit',
          version: 1,
          title: hostile,
          connectors: [{ id: 'c1', label: hostile }],
          nodes: [
            { id: 'b', kind: 'battery', label: hostile },
            { id: 'k', kind: 'cavity', label: hostile, connector: 'c1', number: 1, x: 200 },
            { id: 'm', kind: 'module', label: hostile, x: 400, pins: [{ pin: '1', name: hostile }] },
          ],
          wires: [{ id: 'w', from: 'b.pos', to: 'k.a', colour: '"><script>' }],
          annotations: [{ id: 'n', text: hostile }],
        })
        expect(opened.ok).toBe(true)
        if (!opened.ok) return
        const svg = drawCircuit(opened.value, {
          title: hostile,
          flags: [{ at: 'k.a', number: hostile, value: hostile }],
          tails: [{ wire: 'w', to: 'ground', label: hostile }],
        })
        expect(elementNames(svg).every((name) => known.has(name))).toBe(true)
      }),
      { numRuns: 100, seed: 5 },
    )
  })

  it('paints with tokens and insulation colours only, and has no figure that is not a number', () => {
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        for (const one of circuitPrimitives(circuit, {})) {
          for (const paint of [one.fill, 'stroke' in one ? one.stroke : undefined])
            if (paint !== undefined && !paint.startsWith('#')) expect([...tokens, 'none']).toContain(paint)
          expect(JSON.stringify(one)).not.toMatch(/NaN|null|Infinity/)
        }
      }),
      { numRuns: 100, seed: 9 },
    )
  })

  it('has a mark for every place of every sample', () => {
    for (const circuit of samples)
      for (const { id } of sitesOf(circuit))
        expect(placeMark(circuit, id), `${circuit.title}: ${id}`).not.toBeNull()
  })

  it('redraws what has moved: a closed switch, a relay pulled in, a lit lamp, an open connector', () => {
    const trailer = samples.find((circuit) => circuit.title.startsWith('Trailer'))!
    const rest = drawCircuit(trailer)
    expect(drawCircuit(trailer, { moment: { positions: { brake: 'held' }, unplugged: [] } })).not.toBe(rest)
    expect(drawCircuit(trailer, { moment: { positions: {}, unplugged: ['tl-x'] } })).not.toBe(rest)
    const lit = drawCircuit(trailer, {
      moment: { positions: {}, unplugged: [], works: new Map([['e1', true]]) },
    })
    expect(lit).toContain('E1 left stop, lit')
    const fan = samples.find((circuit) => circuit.title.includes('fan'))!
    const moved = drawCircuit(fan, {
      moment: { positions: {}, unplugged: [], relays: new Map([['k1', true]]) },
    })
    expect(moved).not.toBe(drawCircuit(fan))
  })

  it('shows volts in plates, readings as flags and chevrons where current flows', () => {
    const link = samples[0]!
    const svg = drawCircuit(link, {
      volts: new Map([['c12-3.a', 12.34]]),
      flags: [{ at: 'c12-3.b', number: 'R7', value: '9.87 V' }],
      wireAmps: new Map([['w5', 0.002]]),
    })
    expect(svg).toContain('>12.3<')
    expect(svg).toContain('>R7<')
    expect(svg).toContain('>9.87 V<')
    const chevrons = (amps: number) =>
      circuitPrimitives(link, { wireAmps: new Map([['w5', amps]]) }).length -
      circuitPrimitives(link, {}).length
    expect(chevrons(0.002)).toBeGreaterThan(0)
    expect(chevrons(0)).toBe(0)
  })

  it('draws an empty circuit as an empty sheet', () => {
    const opened = openCircuit({
      format: 'halfsplit-circuit',
      version: 1,
      title: 'New',
      nodes: [],
      wires: [],
    })
    expect(opened.ok && drawCircuit(opened.value)).toContain('viewBox="-28 -28 376 176"')
  })
})
