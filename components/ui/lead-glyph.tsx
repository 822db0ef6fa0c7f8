import { Glyph, type GlyphProps } from './glyphs'

/** A meter's lead: handle with its sign, tip down. */
export function LeadGlyph({ lead, ...props }: GlyphProps & { lead: 'red' | 'black' }) {
  return (
    <Glyph box={24} {...props}>
      <path d="M12 15v8" style={{ stroke: 'var(--ink)' }} strokeWidth="2.6" />
      <rect
        x="6.2"
        y="1.8"
        width="11.6"
        height="14"
        rx="2.5"
        style={{ fill: lead === 'red' ? 'var(--lead-red)' : 'var(--lead-black)', stroke: 'var(--ink)' }}
        strokeWidth="1.6"
      />
      <path
        d={lead === 'red' ? 'M12 5v7M8.5 8.5h7' : 'M8.5 8.5h7'}
        style={{ stroke: 'var(--lead-sign)' }}
        strokeWidth="2.2"
      />
    </Glyph>
  )
}
