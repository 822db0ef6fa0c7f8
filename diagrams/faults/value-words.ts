import type { Reading, ReadingValue } from '../document/reading-schema'

/** "12.57 V", "OL", "4.70 kohm", "works", "high". */
export function valueWords(kind: Reading['kind'], value: ReadingValue): string {
  if (typeof value === 'boolean') return value ? 'works' : 'does not work'
  if (typeof value === 'string') return value
  if (kind === 'ohms') {
    if (value >= 1e6) return `${(value / 1e6).toFixed(2)} Mohm`
    if (value >= 1e3) return `${(value / 1e3).toFixed(2)} kohm`
    return `${value.toFixed(value < 100 ? 1 : 0)} ohm`
  }
  // No minus before what rounds to nothing.
  return `${value.toFixed(2).replace(/^-(0\.00)$/, '$1')} ${kind === 'amps' ? 'A' : 'V'}`
}

/** Of a severity known to a part of its size only: "1.8 ohm", "15 ohm", "4.7 kohm". */
export function aboutOhms(ohms: number): string {
  const [size, unit] = ohms >= 1e6 ? [ohms / 1e6, 'Mohm'] : ohms >= 1e3 ? [ohms / 1e3, 'kohm'] : [ohms, 'ohm']
  return `about ${Number(size.toPrecision(2))} ${unit}`
}

export function percentWords(share: number): string {
  if (share < 0.01) return 'under 1 %'
  if (share > 0.99) return 'over 99 %'
  return `${Math.round(share * 100)} %`
}

/** "a", "a and b", "a, b and c". */
export function listWords(names: readonly string[], joint = 'and'): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} ${joint} ${names.at(-1)}`
}

/** The first few of a list, the rest counted. */
export function fewWords(names: readonly string[], most: number): string {
  const more = names.length - most
  return more > 0 ? `${names.slice(0, most).join(', ')} and ${more} more` : listWords(names)
}

export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}

/** "R4": how a reading is named wherever it is shown, by its place in the order taken. */
export function readingNames(readings: readonly { id: string }[], ids: readonly string[]): string[] {
  return readings.flatMap((reading, index) => (ids.includes(reading.id) ? [`R${index + 1}`] : []))
}
