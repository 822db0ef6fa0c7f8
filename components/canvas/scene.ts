import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Node } from '@/diagrams/document/node-schema'
import { type DrawnWire, drawWires } from '@/diagrams/drawing/drawn-wires'
import { type Moment, type PartState, partState } from '@/diagrams/drawing/part-state'
import type { Box } from '@/diagrams/drawing/primitive'
import { type PlaceMark, placeMark } from '@/diagrams/drawing/verdict-mark'
import type { Verdict } from '@/diagrams/faults/answer'
import { type Flag, type FlagWish, layFlags } from './flag-layout'
import { type ShortTail, shortTails, type ShortFound } from './short-tail'

/** What is laid over a circuit on the sheet. */
export interface Overlay {
  /** By site; empty before the first reading. */
  verdicts: ReadonlyMap<string, Verdict>
  moment: Moment
  /** Readings, the next target, volts of points: plates that point at something. */
  flags: readonly FlagWish[]
  /** Current in each wire, ampere, positive from its `from` end; null draws no chevrons. */
  amps: ReadonlyMap<string, number> | null
  /** Shorts found in wires, drawn as a tail to what the wire touches. */
  shorts: readonly ShortFound[]
  /** A wire or a site that is picked. */
  picked: string | null
  /** Letters for two faults, "A" and "B", by site. */
  letters?: ReadonlyMap<string, string>
}

export const emptyOverlay: Overlay = {
  verdicts: new Map(),
  moment: { positions: {}, unplugged: [] },
  flags: [],
  amps: null,
  shorts: [],
  picked: null,
}

export interface PlacedMark extends PlaceMark {
  site: string
  verdict: Verdict
  /** Where the ring is drawn: with its part, under or over the part's own body. */
  node: string | null
  overBody: boolean
}

/** A circuit with its overlay, laid out once for all that draw it. */
export interface Scene {
  circuit: Circuit
  overlay: Overlay
  wires: ReadonlyMap<string, DrawnWire>
  states: ReadonlyMap<string, PartState>
  nodes: ReadonlyMap<string, Node>
  marks: readonly PlacedMark[]
  flags: readonly Flag[]
  tails: readonly ShortTail[]
}

export function buildScene(circuit: Circuit, overlay: Overlay, flagScale = 1): Scene {
  const marks = [...overlay.verdicts].flatMap(([site, verdict]): PlacedMark[] => {
    const mark = placeMark(circuit, site)
    return mark ? [{ ...mark, site, verdict, ...ringOwner(circuit, site) }] : []
  })
  const flags = layFlags(circuit, overlay.flags, marks, flagScale)
  const wires = drawWires(
    circuit,
    overlay.verdicts,
    flags.map((flag): Box => flag.box),
  )
  return {
    circuit,
    overlay,
    wires,
    states: new Map(circuit.nodes.map((node) => [node.id, partState(circuit, node, overlay.moment)])),
    nodes: new Map(circuit.nodes.map((node) => [node.id, node])),
    marks,
    flags,
    tails: shortTails(circuit, overlay.shorts, wires),
  }
}

function ringOwner(circuit: Circuit, site: string): { node: string | null; overBody: boolean } {
  const colon = site.indexOf(':')
  const kind = site.slice(0, colon)
  if (kind === 'wire') return { node: null, overBody: false }
  const rest = site.slice(colon + 1)
  const dot = rest.indexOf('.')
  const id = dot < 0 ? rest : rest.slice(0, dot)
  const node = circuit.nodes.find((one) => one.id === id)
  return { node: id, overBody: dot >= 0 && node?.kind !== 'cavity' }
}
