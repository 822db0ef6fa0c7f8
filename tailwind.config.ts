import type { Config } from 'tailwindcss'

/** Names for the tokens of `app/globals.css`; the palette holds nothing else, so a stray colour does not compile. */
const tokens = [
  'tray',
  'panel',
  'sheet',
  'window',
  'ink',
  'on-ink',
  'ink-2',
  'ink-3',
  'edge',
  'line',
  'wire-edge',
  'faulty',
  'faulty-band',
  'question',
  'question-band',
  'good',
  'good-band',
  'lead-red',
  'lead-black',
  'lead-sign',
] as const

/** Pixels at a root of 16, in rem so that a projector can scale the root. */
const rem = (px: number) => `${px / 16}rem`

export default {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(tokens.map((name) => [name, `var(--${name})`])),
    },
    fontFamily: {
      sans: ['var(--font-text)'],
      mono: ['var(--font-figures)'],
    },
    fontSize: {
      note: [rem(13), { lineHeight: '1.35', fontWeight: '600' }],
      small: [rem(14), { lineHeight: '1.35' }],
      dense: [rem(15), { lineHeight: '1.35' }],
      body: [rem(16), { lineHeight: '1.35' }],
      lead: [rem(18), { lineHeight: '1.15', fontWeight: '700' }],
      title: [rem(23), { lineHeight: '1.15', fontWeight: '800' }],
      count: [rem(32), { lineHeight: '1.15', fontWeight: '700' }],
      meter: [rem(46), { lineHeight: '1.15', fontWeight: '700' }],
      'meter-tablet': [rem(62), { lineHeight: '1.15', fontWeight: '700' }],
      'meter-phone': [rem(66), { lineHeight: '1.15', fontWeight: '700' }],
    },
    borderRadius: { none: '0', plate: '3px', field: '4px', full: '9999px' },
    boxShadow: { none: 'none', menu: 'var(--shadow-menu)' },
    extend: {
      screens: { tablet: '700px', laptop: '1100px' },
      borderWidth: { control: '1.5px', area: '2px', meter: '2.5px' },
      zIndex: {
        sheet: '0',
        marks: '10',
        flags: '20',
        controls: '30',
        rule: '40',
        head: '50',
        menu: '60',
        dialog: '70',
        message: '80',
      },
      // Heights of what is pressed: 44 the least, 52 on touch fields and in the bay, 60 for keys.
      spacing: { target: rem(44), bay: rem(52), key: rem(60) },
      transitionDuration: { press: '120ms', rule: '200ms' },
    },
  },
} satisfies Config
