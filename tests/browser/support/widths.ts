/** The three devices that every screen is looked at on. */
export const widths = {
  laptop: { width: 1280, height: 800 },
  tablet: { width: 820, height: 1180 },
  phone: { width: 390, height: 844 },
} as const

export type WidthName = keyof typeof widths
export type Scheme = 'light' | 'dark'
export const schemes: readonly Scheme[] = ['light', 'dark']
