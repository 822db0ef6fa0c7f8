const mostCharacters = 9

/** What stands in the window after one key of the meter: a digit, a point, OL, the sign, or one back. */
export function pressKey(text: string, key: string): string {
  switch (key) {
    case 'erase':
      return text === 'OL' ? '' : text.slice(0, -1)
    case 'OL':
      return text === 'OL' ? '' : 'OL'
    case 'sign':
      if (text === 'OL') return text
      return text.startsWith('-') ? text.slice(1) : `-${text}`
    default:
      return cleanText(text === 'OL' ? key : text + key)
  }
}

/** Keeps what a meter can show: one minus in front, one point (a comma is taken as one), digits. */
export function cleanText(text: string): string {
  if (/^\s*o/i.test(text)) return 'OL'
  const plain = text.replaceAll(',', '.').replaceAll(/[^0-9.-]/g, '')
  const minus = plain.startsWith('-') ? '-' : ''
  const [whole = '', ...rest] = plain.replaceAll('-', '').split('.')
  return (minus + (rest.length > 0 ? `${whole}.${rest.join('')}` : whole)).slice(0, mostCharacters)
}
