'use client'

import { verdictGlyph } from '@/diagrams/drawing/verdict-mark'
import { chevrons } from './chevrons'
import { FlagDrawing } from './flag-drawing'
import { useInks } from './inks'
import { Primitives } from './primitives'
import type { PlacedMark, Scene } from './scene'

/** All that lies over the wires and parts: chevrons, tails of shorts, glyphs, flags. In the sheet's coordinates. */
export function MarksDrawing({ scene }: { scene: Scene }) {
  const { paint, text } = useInks()
  const { amps, letters } = scene.overlay
  return (
    <g>
      {amps &&
        [...scene.wires.values()].map((drawn) => (
          <Primitives key={drawn.wire.id} of={chevrons(drawn.route, amps.get(drawn.wire.id) ?? 0)} />
        ))}
      {scene.tails.map((tail) => (
        <Primitives key={tail.wire} of={tail.primitives} />
      ))}
      {scene.marks.filter(hasGlyph).map((mark) => (
        <g key={mark.site}>
          <Primitives of={verdictGlyph(mark.verdict, mark.glyph)} />
          {letters?.has(mark.site) && (
            <text
              x={mark.glyph.x + 17}
              y={mark.glyph.y + 5}
              style={{ fill: paint('ink'), fontFamily: text, fontSize: '14px', fontWeight: 800 }}
            >
              {letters.get(mark.site)}
            </text>
          )}
        </g>
      ))}
      {scene.flags.map((flag) => (
        <FlagDrawing key={flag.id} flag={flag} />
      ))}
    </g>
  )
}

/** A proved wire has its two rails and a proved contact its ring: ticks on parts only, so that the sheet stays quiet. */
function hasGlyph(mark: PlacedMark): boolean {
  if (mark.verdict === 'faulty') return true
  if (mark.site.startsWith('wire:')) return mark.verdict === 'in-question'
  return !mark.site.startsWith('contact:') || mark.ring === null || !mark.overBody
}
