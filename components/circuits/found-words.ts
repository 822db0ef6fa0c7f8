import type { CircuitPage } from '@/lib/shared/api/circuits'
import { type Finders, findersWords } from './finders'

function plural(count: number, one: string, many: string): string {
  return `${count} ${count === 1 ? one : many}`
}

/** "5 cavities fit": how many there are over all pages. */
export function countWords(page: CircuitPage, rows: CircuitPage['rows']): string {
  const count = page.found.rows
  const kinds = new Set(rows.map((row) => row.kind))
  if (kinds.has('cavity')) return `${plural(count, 'cavity fits', 'cavities fit')}`
  if (kinds.has('wire')) return `${plural(count, 'wire fits', 'wires fit')}`
  return count === 0 ? 'Nothing fits' : plural(count, 'circuit', 'circuits')
}

/** Beside the count: in how many circuits, and what was asked for. */
export function captionWords(page: CircuitPage, rows: CircuitPage['rows'], finders: Finders): string {
  const asked = findersWords(finders)
  if (rows.some((row) => row.kind !== 'circuit'))
    return [`in ${plural(page.found.circuits, 'circuit', 'circuits')}`, asked].filter(Boolean).join(', ')
  return asked || 'all systems'
}
