import type { Circuit } from '../document/circuit-schema'
import { splitEnd } from '../document/ports'
import { connectorOutlines } from './connector-outline'
import { drawWires } from './drawn-wires'
import { partBox } from './part-geometry'
import { partLabels, textBox } from './part-label'
import { partState } from './part-state'
import { boxesMeet, grow, type Box, type Place } from './primitive'

interface Run {
  wire: string
  from: Place
  to: Place
}

/** Nearer than this two parallel wires read as one. */
const apartPixels = 26

/** What a careful person would still move: sentences, empty when the drawing is clean. */
export function layoutFaults(circuit: Circuit): string[] {
  const faults: string[] = []
  const wires = [...drawWires(circuit).values()]
  const runs = wires.flatMap(({ wire, route }) =>
    route.slice(1).map((to, at): Run => ({ wire: wire.id, from: route[at] as Place, to })),
  )
  const parts = circuit.nodes.map((node) => ({
    node,
    // A splice is a dot, a ground's bars hang under its port: the boxes are for the hand, this is the ink.
    box: grow({ x: node.x, y: node.y, ...size(partBox(node)) }, node.kind === 'splice' ? -10 : -1),
    labels: partLabels(circuit, node, partState(circuit, node, { positions: {}, unplugged: [] })).map(
      (text) => ({
        text: text.text,
        box: shift(textBox(text), node.x, node.y),
      }),
    ),
  }))
  for (const { wire, route } of wires) {
    if (route.length < 2) faults.push(`wire ${wire.id} has no way`)
    const ends = [splitEnd(wire.from).node, splitEnd(wire.to).node]
    for (const run of runs.filter((one) => one.wire === wire.id)) {
      if (run.from.x !== run.to.x && run.from.y !== run.to.y) faults.push(`wire ${wire.id} runs aslant`)
      for (const { node, box } of parts)
        if (!ends.includes(node.id) && boxesMeet(runBox(run, 2), box))
          faults.push(`wire ${wire.id} runs through ${node.id}`)
        else if (
          ends.includes(node.id) &&
          node.kind !== 'splice' &&
          boxesMeet(runBox(run, 0.5), grow(box, -1))
        )
          faults.push(`wire ${wire.id} runs over its own end ${node.id}`)
    }
  }
  for (const [at, one] of runs.entries())
    for (const other of runs.slice(at + 1))
      if (one.wire !== other.wire && tooNear(one, other))
        faults.push(`wires ${one.wire} and ${other.wire} run closer than ${apartPixels} px`)
  for (const [at, one] of parts.entries()) {
    for (const other of parts.slice(at + 1))
      if (boxesMeet(one.box, other.box)) faults.push(`${one.node.id} stands on ${other.node.id}`)
    for (const label of one.labels) {
      for (const other of parts)
        if (other !== one && boxesMeet(label.box, other.box))
          faults.push(`name "${label.text}" stands on ${other.node.id}`)
      for (const run of runs)
        if (boxesMeet(label.box, runBox(run, 3)))
          faults.push(`name "${label.text}" stands on wire ${run.wire}`)
    }
  }
  const names = [
    ...parts.flatMap((part) => part.labels),
    ...connectorOutlines(circuit).flatMap(({ primitives }) =>
      primitives.flatMap((one) => (one.kind === 'text' ? [{ text: one.text, box: textBox(one) }] : [])),
    ),
    ...wires.flatMap(({ label }) => (label ? [{ text: label.text, box: label.plate }] : [])),
  ]
  for (const [at, one] of names.entries())
    for (const other of names.slice(at + 1))
      if (boxesMeet(one.box, other.box)) faults.push(`words "${one.text}" and "${other.text}" meet`)
  for (const { wire, label } of wires) {
    if (!label) continue
    for (const { node, box } of parts)
      if (boxesMeet(label.plate, box)) faults.push(`label of wire ${wire.id} stands on ${node.id}`)
    for (const run of runs)
      if (boxesMeet(label.plate, runBox(run, 2)))
        faults.push(`label of wire ${wire.id} stands on wire ${run.wire}`)
  }
  return [...new Set(faults)]
}

function size({ width, height }: { width: number; height: number }) {
  return { width, height }
}

function shift(box: Box, dx: number, dy: number): Box {
  return { ...box, x: box.x + dx, y: box.y + dy }
}

function runBox(run: Run, half: number): Box {
  return {
    x: Math.min(run.from.x, run.to.x) - half,
    y: Math.min(run.from.y, run.to.y) - half,
    width: Math.abs(run.from.x - run.to.x) + 2 * half,
    height: Math.abs(run.from.y - run.to.y) + 2 * half,
  }
}

/** Parallel, side by side over more than a few pixels, and not far enough apart. */
function tooNear(one: Run, other: Run): boolean {
  const level = one.from.y === one.to.y
  if (level !== (other.from.y === other.to.y)) return false
  const along = (place: Place) => (level ? place.x : place.y)
  const across = (place: Place) => (level ? place.y : place.x)
  if (Math.abs(across(one.from) - across(other.from)) >= apartPixels) return false
  const shared =
    Math.min(Math.max(along(one.from), along(one.to)), Math.max(along(other.from), along(other.to))) -
    Math.max(Math.min(along(one.from), along(one.to)), Math.min(along(other.from), along(other.to)))
  return shared > 4
}
