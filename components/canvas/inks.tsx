'use client'

import { createContext, useContext } from 'react'
import type { Paint } from '@/diagrams/drawing/primitive'
import { inkOf, lightInks } from '@/diagrams/drawing/theme-inks'

export interface Inks {
  paint: (paint: Paint) => string
  text: string
  figures: string
}

/** On the screen a token stays a token, so that light and dark change without drawing anew. */
export const screenInks: Inks = {
  paint: (paint) => (paint === 'none' || paint.startsWith('#') ? paint : `var(--${paint})`),
  text: 'var(--font-text)',
  figures: 'var(--font-figures)',
}

/** What leaves the product is painted with the inks themselves, on white. */
export const printInks: Inks = {
  paint: (paint) => inkOf(paint, lightInks),
  text: screenInks.text,
  figures: screenInks.figures,
}

export const InksContext = createContext<Inks>(screenInks)

export function useInks(): Inks {
  return useContext(InksContext)
}
