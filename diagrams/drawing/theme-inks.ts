import type { Paint, Token } from './primitive'

/** Tokens as the product paints them, for drawings that leave it: SVG, PNG and print are always on white ground. */
export const lightInks: Readonly<Record<Token, string>> = {
  ink: '#101819',
  'on-ink': '#FFFFFF',
  'ink-2': '#364244',
  'ink-3': '#4F5C5D',
  sheet: '#FCFDFB',
  window: '#FFFFFF',
  panel: '#F0F4F0',
  line: '#B7C2BB',
  edge: '#6B7873',
  'wire-edge': '#20282A',
  faulty: '#B3200B',
  'faulty-band': '#D63A1C',
  question: '#6A4800',
  'question-band': '#B57800',
  good: '#005F6C',
  'good-band': '#007F90',
}

export const darkInks: Readonly<Record<Token, string>> = {
  ink: '#EFF4F0',
  'on-ink': '#0D1214',
  'ink-2': '#BDC8C4',
  'ink-3': '#98A5A1',
  sheet: '#151B1D',
  window: '#070A0B',
  panel: '#1E2628',
  line: '#354144',
  edge: '#7F8D89',
  'wire-edge': '#D5DDD9',
  faulty: '#FF8466',
  'faulty-band': '#FF6A48',
  question: '#F7C34A',
  'question-band': '#F0B429',
  good: '#6AD0DC',
  'good-band': '#4CBECC',
}

export function inkOf(paint: Paint, inks: Readonly<Record<Token, string>>): string {
  return paint === 'none' || paint.startsWith('#') ? paint : inks[paint as Token]
}
