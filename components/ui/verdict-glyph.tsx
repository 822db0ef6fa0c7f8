import type { Verdict } from '@/diagrams/faults/answer'
import { Glyph, type GlyphProps } from './glyphs'

export const verdictWords: Record<Verdict, string> = {
  faulty: 'faulty',
  'in-question': 'in question',
  'proved-good': 'proved good',
}

/** The three verdicts, told apart by shape: crossed diamond, round with a question mark, bare tick. */
export function VerdictGlyph({ verdict, ...props }: GlyphProps & { verdict: Verdict }) {
  if (verdict === 'faulty')
    return (
      <Glyph box={24} {...props}>
        <path
          d="M12 1.4 22.6 12 12 22.6 1.4 12z"
          style={{ fill: 'var(--faulty-band)', stroke: 'var(--ink)' }}
          strokeWidth="1.8"
        />
        <path d="m8.4 8.4 7.2 7.2m0-7.2-7.2 7.2" style={{ stroke: 'var(--on-ink)' }} strokeWidth="2.6" />
      </Glyph>
    )
  if (verdict === 'in-question')
    return (
      <Glyph box={24} {...props}>
        <circle
          cx="12"
          cy="12"
          r="9.8"
          style={{ fill: 'var(--sheet)', stroke: 'var(--question-band)' }}
          strokeWidth="2.6"
        />
        <path
          d="M8.8 9.6c0-2 1.4-3.2 3.2-3.2s3.2 1.2 3.2 2.9c0 2.3-3.1 2.3-3.1 4.7M12.1 16v2"
          style={{ stroke: 'var(--question)' }}
          strokeWidth="2.2"
        />
      </Glyph>
    )
  return (
    <Glyph box={24} {...props}>
      <path d="m3.4 13.2 6 5.6L20.8 5.2" style={{ stroke: 'var(--good)' }} strokeWidth="3" />
    </Glyph>
  )
}
