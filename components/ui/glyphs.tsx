import type { ReactNode } from 'react'

export interface GlyphProps {
  /** Side in px at the text's own scale. */
  size?: number
  className?: string
  /** Spoken; without it the glyph is decoration beside words. */
  title?: string
}

export function Glyph({
  size = 20,
  className,
  title,
  box = 20,
  children,
}: GlyphProps & { box?: number; children: ReactNode }) {
  return (
    <svg
      viewBox={`0 0 ${box} ${box}`}
      width={size}
      height={size}
      className={className}
      fill="none"
      stroke="currentColor"
      strokeWidth="2.4"
      role={title ? 'img' : undefined}
      aria-label={title}
      aria-hidden={title ? undefined : true}
      focusable="false"
      style={{ flex: 'none' }}
    >
      {children}
    </svg>
  )
}

export function Tick(props: GlyphProps) {
  return (
    <Glyph {...props}>
      <path d="M2.5 11.2 7.6 16 17.5 4.2" strokeWidth="3" />
    </Glyph>
  )
}

/** Caution and refused input. */
export function Triangle(props: GlyphProps) {
  return (
    <Glyph {...props}>
      <path d="M10 2.4 18.6 17.4H1.4z" strokeWidth="2" strokeLinejoin="round" />
      <path d="M10 7.6v5M10 14v1.8" strokeWidth="2" />
    </Glyph>
  )
}

const turns = { right: 0, down: 90, left: 180, up: 270 } as const

/** An open angle: back, next, carrying current. */
export function Chevron({ direction = 'right', ...props }: GlyphProps & { direction?: keyof typeof turns }) {
  return (
    <Glyph {...props}>
      <path d="M6.5 3 14 10l-7.5 7" strokeWidth="2.8" transform={`rotate(${turns[direction]} 10 10)`} />
    </Glyph>
  )
}

export function Plus(props: GlyphProps) {
  return (
    <Glyph {...props}>
      <path d="M10 3.5v13M3.5 10h13" />
    </Glyph>
  )
}

export function Minus(props: GlyphProps) {
  return (
    <Glyph {...props}>
      <path d="M3.5 10h13" />
    </Glyph>
  )
}

/** The sign for ohm; neither face has the letter. */
export function OhmSign(props: GlyphProps) {
  return (
    <Glyph {...props}>
      <path
        d="M2.6 17.2h5v-2.5C5 13.3 3.6 11.4 3.6 9 3.6 5.4 6.4 2.8 10 2.8s6.4 2.6 6.4 6.2c0 2.4-1.4 4.3-4 5.7v2.5h5"
        strokeWidth="2"
      />
    </Glyph>
  )
}

/** Takes the last digit back. */
export function Erase(props: GlyphProps) {
  return (
    <Glyph {...props}>
      <path d="M6.4 3.6h12v12.8h-12L1.4 10z" strokeWidth="2" strokeLinejoin="round" />
      <path d="m9.4 7.2 5.6 5.6m0-5.6-5.6 5.6" strokeWidth="2" />
    </Glyph>
  )
}
