/** One insulation colour: its letters, its name, and the sRGB ink it is drawn with in both themes. */
export interface WireColour {
  code: string
  name: string
  ink: string
}

/**
 * Letter codes of IEC 60757 (2021, clauses 4 and 5.1; the same table in GOST 28763-90), in the standard's order.
 * The standard gives no inks: these are ours, chosen to stay apart from one another and from the verdict bands.
 */
export const wireColours: readonly WireColour[] = [
  { code: 'BK', name: 'black', ink: '#1C1F20' },
  { code: 'BN', name: 'brown', ink: '#7B4A21' },
  { code: 'RD', name: 'red', ink: '#D2202B' },
  { code: 'OG', name: 'orange', ink: '#EE7B14' },
  { code: 'YE', name: 'yellow', ink: '#F3D11F' },
  { code: 'GN', name: 'green', ink: '#1F8C3F' },
  { code: 'BU', name: 'blue', ink: '#2160C8' },
  { code: 'VT', name: 'violet', ink: '#7F41B3' },
  { code: 'GY', name: 'grey', ink: '#8B9294' },
  { code: 'WH', name: 'white', ink: '#FAFAF6' },
  { code: 'PK', name: 'pink', ink: '#F3A3BE' },
  { code: 'TQ', name: 'turquoise', ink: '#22B3AE' },
  { code: 'GD', name: 'gold', ink: '#B5923A' },
  { code: 'SR', name: 'silver', ink: '#C5CBCD' },
]

const byCode = new Map(wireColours.map((colour) => [colour.code, colour]))

export function findWireColour(code: string): WireColour | undefined {
  return byCode.get(code.toUpperCase())
}

/**
 * Base and stripe of a written colour: "RD", "RD/WH", "GNYE" (green with a yellow stripe, the protective pair of
 * IEC 60757). Null where the letters are not of the table, so that nothing is drawn in a colour nobody named.
 */
export function readWireColour(written: string): { base: WireColour; stripe: WireColour | null } | null {
  const text = written.trim().toUpperCase()
  const [baseCode, stripeCode] =
    text === 'GNYE' ? ['GN', 'YE'] : text.includes('/') ? text.split('/', 2) : text.split('-', 2)
  const base = baseCode === undefined ? undefined : byCode.get(baseCode)
  if (!base) return null
  if (stripeCode === undefined) return { base, stripe: null }
  const stripe = byCode.get(stripeCode)
  return stripe ? { base, stripe: stripe.code === base.code ? null : stripe } : null
}

/** "RD/WH" as "red with a white stripe"; the letters themselves when they are not of the table. */
export function wireColourName(written: string): string {
  const colour = readWireColour(written)
  if (!colour) return written
  return colour.stripe ? `${colour.base.name} with a ${colour.stripe.name} stripe` : colour.base.name
}
