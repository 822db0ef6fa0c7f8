import type { Circuit } from '../document/circuit-schema'
import { connectorOutlines } from './connector-outline'
import { currentChevrons } from './current-chevron'
import { drawingBounds } from './drawing-bounds'
import { drawWires, labelObstacles, type DrawnWire } from './drawn-wires'
import { drawNotes } from './drawn-notes'
import type { Overlay } from './overlay'
import { partLabels } from './part-label'
import { partState, type Moment } from './part-state'
import { partSymbol } from './part-symbol'
import { grow, type Box, type Place, type Primitive } from './primitive'
import { readingFlags } from './reading-flag'
import { shortTail, shortTailBoxes } from './short-tail'
import { escapeXml, primitivesToSvg } from './svg-text'
import { darkInks, lightInks } from './theme-inks'
import { glyphBox, isInside, placeMark, ringStrokes, verdictGlyph } from './verdict-mark'
import { voltsPlates } from './volts-plate'
import { wireLabelSize } from './wire-label'
import { wireStack, type VerdictMark } from './wire-stroke'

const marginPixels = 28
const titlePixels = 44

/**
 * A whole circuit as one SVG document that stands by itself: same shapes, same order and same marks as the sheet.
 * Every text of the document goes in escaped, as text.
 */
export function drawCircuit(circuit: Circuit, overlay: Overlay = {}): string {
  const inks = overlay.theme === 'dark' ? darkInks : lightInks
  const primitives = circuitPrimitives(circuit, overlay)
  const bounds = grow(drawingBounds(primitives), marginPixels)
  const head = overlay.title ? titlePixels : 0
  const view = { x: bounds.x, y: bounds.y - head, width: bounds.width, height: bounds.height + head }
  const title: Primitive[] = overlay.title
    ? [
        {
          kind: 'text',
          x: bounds.x + marginPixels,
          y: view.y + 36,
          text: overlay.title,
          size: 23,
          weight: 800,
          anchor: 'start',
          fill: 'ink',
        },
      ]
    : []
  const ground: Primitive = { kind: 'rect', ...view, fill: 'sheet' }
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="${view.x} ${view.y} ${view.width} ${view.height}" ` +
    `width="${view.width}" height="${view.height}" role="img"><title>${escapeXml(overlay.title ?? circuit.title)}</title>` +
    `${primitivesToSvg([ground, ...title, ...primitives], inks)}</svg>`
  )
}

/** The drawing as primitives in sheet coordinates, bottom up: wires, rings, parts, labels, marks, flags. */
export function circuitPrimitives(circuit: Circuit, overlay: Overlay): Primitive[] {
  const verdicts = overlay.verdicts ?? new Map<string, VerdictMark>()
  const moment: Moment = overlay.moment ?? { positions: {}, unplugged: [] }
  const tails = shortTailBoxes(circuit, overlay.tails ?? [])
  const obstacles = [...labelObstacles(circuit), ...tails]
  const bare = [...drawWires(circuit, verdicts).values()]
  const marks = glyphPlaces(circuit, verdicts)
  const glyphs = marks.map(({ verdict, at }) => glyphBox(verdict, at))
  const flags = readingFlags(circuit, overlay.flags ?? [], [...obstacles, ...glyphs, ...runBoxes(bare)])
  // Labels give way to flags and glyphs; the plates take what is left.
  const wires = [
    ...drawWires(circuit, verdicts, [
      ...flags.flatMap((flag) => [grow(flag.box, 2), flag.pointer]),
      ...glyphs,
    ]).values(),
  ]
  const plates = voltsPlates(circuit, overlay.volts ?? new Map(), [
    ...obstacles,
    ...runBoxes(bare),
    ...wires.flatMap(({ label }) => (label ? [label.plate] : [])),
    ...flags.map((flag) => flag.box),
    ...glyphs,
  ])
  return [
    ...connectorOutlines(circuit).flatMap((outline) => outline.primitives),
    ...wires.flatMap((wire) => wirePrimitives(wire, verdicts.get(`wire:${wire.wire.id}`) ?? null)),
    ...(overlay.tails ?? []).flatMap((tail) => shortTail(circuit, tail)),
    ...rings(circuit, verdicts, false),
    ...circuit.nodes.flatMap((node) => {
      const state = partState(circuit, node, moment)
      return [...partSymbol(node, state), ...partLabels(circuit, node, state)].map((one) =>
        moved(one, node.x, node.y),
      )
    }),
    ...rings(circuit, verdicts, true),
    ...wires.flatMap(labelPrimitives),
    ...wires.flatMap(({ wire, route, crossings }) =>
      currentChevrons(route, wire.mm2, overlay.wireAmps?.get(wire.id) ?? 0, crossings),
    ),
    ...drawNotes(circuit),
    ...marks.flatMap(({ site, verdict, at }) => verdictGlyph(verdict, at, overlay.letters?.get(site))),
    ...plates.flatMap((plate) => plate.primitives),
    ...flags.flatMap((flag) => flag.primitives),
  ]
}

function wirePrimitives({ wire, pieces }: DrawnWire, verdict: VerdictMark | null): Primitive[] {
  return wireStack(wire, verdict).flatMap((stroke) =>
    pieces.map(
      (piece): Primitive => ({
        kind: 'path',
        d: piece.d,
        fill: 'none',
        stroke: stroke.stroke,
        strokeWidth: stroke.width,
        cap: stroke.cap,
        ...(stroke.dash ? { dash: stroke.dash, dashOffset: piece.startsAt } : {}),
      }),
    ),
  )
}

function labelPrimitives({ label }: DrawnWire): Primitive[] {
  if (!label) return []
  return [
    { kind: 'rect', ...label.plate, fill: 'sheet' },
    {
      kind: 'text',
      x: label.x,
      y: label.y,
      text: label.text,
      size: wireLabelSize,
      weight: 600,
      anchor: 'start',
      fill: 'ink-2',
    },
  ]
}

function rings(circuit: Circuit, verdicts: ReadonlyMap<string, VerdictMark>, inside: boolean): Primitive[] {
  return [...verdicts].flatMap(([site, verdict]) => {
    const mark = isInside(site) === inside ? placeMark(circuit, site) : null
    return mark ? ringStrokes(mark, verdict) : []
  })
}

/** Glyphs where they can be told apart: on faulty and in-question places; a tick for what is proved good. */
function glyphPlaces(
  circuit: Circuit,
  verdicts: ReadonlyMap<string, VerdictMark>,
): { site: string; verdict: VerdictMark; at: Place }[] {
  return [...verdicts].flatMap(([site, verdict]) => {
    // Rails and rings say it for wires and contacts: a tick on each would hide the drawing.
    if (verdict === 'proved-good' && (site.startsWith('wire:') || site.startsWith('contact:'))) return []
    const mark = placeMark(circuit, site)
    return mark ? [{ site, verdict, at: mark.glyph }] : []
  })
}

function runBoxes(wires: readonly DrawnWire[]): Box[] {
  return wires.flatMap(({ route }) =>
    route.slice(1).map((to, at) => {
      const from = route[at] as (typeof route)[number]
      return grow(
        {
          x: Math.min(from.x, to.x),
          y: Math.min(from.y, to.y),
          width: Math.abs(from.x - to.x),
          height: Math.abs(from.y - to.y),
        },
        6,
      )
    }),
  )
}

/** A primitive shifted over the sheet; paths carry absolute commands only, so every pair or single is moved. */
export function moved(one: Primitive, dx: number, dy: number): Primitive {
  switch (one.kind) {
    case 'line':
      return { ...one, x1: one.x1 + dx, y1: one.y1 + dy, x2: one.x2 + dx, y2: one.y2 + dy }
    case 'circle':
      return { ...one, cx: one.cx + dx, cy: one.cy + dy }
    case 'path':
      return { ...one, d: movedPath(one.d, dx, dy) }
    default:
      return { ...one, x: one.x + dx, y: one.y + dy }
  }
}

function movedPath(d: string, dx: number, dy: number): string {
  return d.replace(/([MLQHVACSZ])([^MLQHVACSZ]*)/g, (_, command: string, rest: string) => {
    const numbers = rest.match(/-?\d+(\.\d+)?/g)?.map(Number) ?? []
    const shifted = numbers.map((value, at) => {
      if (command === 'H') return value + dx
      if (command === 'V') return value + dy
      if (command === 'A') return at % 7 === 5 ? value + dx : at % 7 === 6 ? value + dy : value
      return at % 2 === 0 ? value + dx : value + dy
    })
    return command + shifted.map((value) => Math.round(value * 100) / 100).join(' ')
  })
}
