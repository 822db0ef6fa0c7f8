import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Node } from '@/diagrams/document/node-schema'
import { type DrawnWire, drawWires, labelObstacles } from '@/diagrams/drawing/drawn-wires'
import type { Overlay } from '@/diagrams/drawing/overlay'
import { type PartState, partState } from '@/diagrams/drawing/part-state'
import { type Box, grow, type Place } from '@/diagrams/drawing/primitive'
import { type PlacedFlag, readingFlags } from '@/diagrams/drawing/reading-flag'
import { shortTailBoxes } from '@/diagrams/drawing/short-tail'
import { glyphBox, type PlaceMark, placeMark } from '@/diagrams/drawing/verdict-mark'
import { type VoltsPlate, voltsPlates } from '@/diagrams/drawing/volts-plate'
import { wireRoute } from '@/diagrams/drawing/wire-route'
import type { VerdictMark } from '@/diagrams/drawing/wire-stroke'

export interface PlacedMark extends PlaceMark {
  site: string
  verdict: VerdictMark
  /** The part that the ring is drawn with; null for a wire, whose band is its own. */
  node: string | null
  /** On the part's body, not under it: one of several places within a part. */
  overBody: boolean
}

/** A circuit with its overlay, laid out once for all that draw it. */
export interface Scene {
  circuit: Circuit
  overlay: Overlay
  wires: ReadonlyMap<string, DrawnWire>
  nodes: ReadonlyMap<string, Node>
  states: ReadonlyMap<string, PartState>
  marks: readonly PlacedMark[]
  /** The marks that carry a glyph. */
  glyphs: readonly PlacedMark[]
  flags: readonly PlacedFlag[]
  plates: readonly VoltsPlate[]
  /** A wire that is picked. */
  picked: string | null
}

export function buildScene(circuit: Circuit, overlay: Overlay, picked: string | null = null): Scene {
  const verdicts = overlay.verdicts ?? new Map<string, VerdictMark>()
  const tails = shortTailBoxes(circuit, overlay.tails ?? [])
  const taken = [
    ...labelObstacles(circuit),
    ...tails,
    ...runBoxes(circuit.wires.map((wire) => wireRoute(circuit, wire))),
  ]
  const marks = [...verdicts].flatMap(([site, verdict]): PlacedMark[] => {
    const mark = placeMark(circuit, site)
    return mark ? [{ ...mark, site, verdict, ...ringOwner(circuit, site) }] : []
  })
  const manyLeft = marks.filter((mark) => mark.verdict === 'in-question').length > 12
  const shown = marks.filter((mark) => hasGlyph(mark, manyLeft))
  const glyphs = shown.map((mark) => glyphBox(mark.verdict, mark.glyph))
  const flags = readingFlags(circuit, overlay.flags ?? [], [...taken, ...glyphs])
  const plates = voltsPlates(circuit, overlay.volts ?? new Map(), [
    ...taken,
    ...flags.map((flag) => flag.box),
    ...glyphs,
  ])
  const moment = overlay.moment ?? { positions: {}, unplugged: [] }
  return {
    circuit,
    overlay,
    wires: drawWires(circuit, verdicts, [
      ...[...flags, ...plates].map((one) => grow(one.box, 2)),
      ...flags.map((flag) => flag.pointer),
      ...glyphs,
      ...tails,
    ]),
    nodes: new Map(circuit.nodes.map((node) => [node.id, node])),
    states: new Map(circuit.nodes.map((node) => [node.id, partState(circuit, node, moment)])),
    marks,
    glyphs: shown,
    flags,
    plates,
    picked,
  }
}

function ringOwner(circuit: Circuit, site: string): { node: string | null; overBody: boolean } {
  const colon = site.indexOf(':')
  if (site.slice(0, colon) === 'wire') return { node: null, overBody: false }
  const rest = site.slice(colon + 1)
  const dot = rest.indexOf('.')
  const id = dot < 0 ? rest : rest.slice(0, dot)
  const node = circuit.nodes.find((one) => one.id === id)
  return { node: id, overBody: dot >= 0 && node?.kind !== 'cavity' }
}

function runBoxes(routes: readonly Place[][]): Box[] {
  return routes.flatMap((route) =>
    route.slice(1).map((to, at) => {
      const from = route[at] as Place
      const [x, y] = [Math.min(from.x, to.x), Math.min(from.y, to.y)]
      return grow({ x, y, width: Math.abs(from.x - to.x), height: Math.abs(from.y - to.y) }, 6)
    }),
  )
}

/**
 * Rails, rungs and rings say it for wires and contacts: a glyph on each would hide the drawing. So a tick goes on parts
 * only, and while much is left a question mark goes on parts only, too.
 */
function hasGlyph({ site, verdict }: PlacedMark, manyLeft: boolean): boolean {
  if (verdict === 'faulty') return true
  const inner = site.startsWith('contact:') && site.includes('.')
  if (verdict === 'proved-good') return !site.startsWith('wire:') && !site.startsWith('contact:')
  return !inner && !site.startsWith('pin:') && !(manyLeft && site.startsWith('wire:'))
}
