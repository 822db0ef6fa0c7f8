/** How a typed word and a stored one are brought to the same form before they are compared byte by byte. */
export function textKey(text: string): string {
  return text.normalize('NFKC').toLowerCase().replace(/\s+/g, ' ').trim()
}

/** The words of a text, once each; everything but letters and digits separates. */
export function wordsOf(text: string): string[] {
  return [...new Set((textKey(text).match(/[\p{L}\p{N}]+/gu) ?? []).map((word) => word.slice(0, 60)))]
}

export function codeKey(code: string, failureType: string | null | undefined): string {
  return failureType ? `${code}-${failureType}` : code
}

export interface ColourKey {
  base: string
  /** Empty: no stripe. */
  stripe: string
}

/** Base and stripe of `BU/WH`, `bu-wh` or `GNYE`; a colour written in other words is a base as it stands. */
export function colourKey(colour: string): ColourKey {
  const plain = colour.toUpperCase().trim()
  const [base = '', stripe = ''] = /^[A-Z]{4}$/.test(plain)
    ? [plain.slice(0, 2), plain.slice(2)]
    : plain.split(/[/\- ]+/)
  return { base, stripe }
}

/** Every text that begins with `start` lies from `start` to below this, in byte order. */
export function endOfBeginning(start: string): string {
  return `${start}\u{10FFFF}`
}
