'use client'

import { memo } from 'react'
import { currentChevrons } from '@/diagrams/drawing/current-chevron'
import { drawNotes } from '@/diagrams/drawing/drawn-notes'
import { shortTail } from '@/diagrams/drawing/short-tail'
import { verdictGlyph } from '@/diagrams/drawing/verdict-mark'
import { Primitives } from './primitives'
import type { Scene } from './scene'
import { WireLabelDrawing } from './wire-drawing'

/** Under this size of the sheet only picked wires and those in question keep their labels. */
const labelsFrom = 0.7

/**
 * All that lies over wires and parts: labels, chevrons, tails of shorts, glyphs, plates and flags. Kept while a figure
 * is typed, because nothing of it changes then.
 */
export const MarksDrawing = memo(function MarksDrawing({ scene, zoom = 1 }: { scene: Scene; zoom?: number }) {
  const { verdicts, wireAmps, tails } = scene.overlay
  const wires = [...scene.wires.values()]
  return (
    <g>
      {wires
        .filter(
          ({ wire }) =>
            zoom >= labelsFrom ||
            scene.picked === wire.id ||
            verdicts?.get(`wire:${wire.id}`) === 'in-question' ||
            verdicts?.get(`wire:${wire.id}`) === 'faulty',
        )
        .map((drawn) => (
          <WireLabelDrawing key={drawn.wire.id} drawn={drawn} />
        ))}
      {wireAmps &&
        wires.map(({ wire, route }) => (
          <Primitives key={wire.id} of={currentChevrons(route, wire.mm2, wireAmps.get(wire.id) ?? 0)} />
        ))}
      {tails?.map((tail) => (
        <Primitives key={tail.wire} of={shortTail(scene.circuit, tail)} />
      ))}
      <Primitives of={drawNotes(scene.circuit)} />
      {scene.glyphs.map((mark) => (
        <Primitives
          key={mark.site}
          of={verdictGlyph(mark.verdict, mark.glyph, scene.overlay.letters?.get(mark.site))}
        />
      ))}
      {scene.plates.map((plate) => (
        <Primitives key={plate.point} of={plate.primitives} />
      ))}
      {scene.flags.map((flag, index) => (
        <Primitives key={`${flag.box.x} ${flag.box.y} ${index}`} of={flag.primitives} />
      ))}
    </g>
  )
})
