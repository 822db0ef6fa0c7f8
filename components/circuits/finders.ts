import type { CircuitSearch } from '@/lib/shared/api/circuits'

/** What has been typed into the finders, as text; an empty one asks for nothing. */
export type Finders = Record<Exclude<keyof CircuitSearch, 'cursor'>, string>

export const finderNames = ['name', 'code', 'connector', 'cavity', 'colour', 'system'] as const

export const noFinders: Finders = { name: '', code: '', connector: '', cavity: '', colour: '', system: '' }

export function readFinders(params: { get: (name: string) => string | null }): Finders {
  const finders = { ...noFinders }
  for (const name of finderNames) finders[name] = params.get(name)?.slice(0, 120) ?? ''
  return finders
}

/** As a search string in a fixed order, so that the same question has the same address. */
export function findersQuery(finders: Finders): string {
  const params = new URLSearchParams()
  for (const name of finderNames) {
    const value = finders[name].trim()
    if (value !== '' && !(name === 'cavity' && cavityProblem(value))) params.set(name, value)
  }
  return params.toString()
}

export function cavityProblem(value: string): string | null {
  const text = value.trim()
  return text === '' || /^[1-9][0-9]{0,2}$/.test(text)
    ? null
    : `Cavity ${text}: expected a whole number from 1 to 999.`
}

/** The system is picked in the index, not typed; it does not count as a finder. */
export function anyFinder(finders: Finders): boolean {
  return finderNames.some((name) => name !== 'system' && finders[name].trim() !== '')
}

/** What the rows were asked for, in words: "cavity 3 with a BU/WH wire, in Lamps". */
export function findersWords(finders: Finders): string {
  const parts: string[] = []
  const { name, code, connector, cavity, colour, system } = finders
  if (connector) parts.push(`connector ${connector}`)
  if (cavity) parts.push(`cavity ${cavity}`)
  if (colour) parts.push(colour.endsWith('/') ? `a plain ${colour.slice(0, -1)} wire` : `a ${colour} wire`)
  if (code) parts.push(`code ${code.toUpperCase()}`)
  if (name) parts.push(`"${name}"`)
  const words = parts.join(', ')
  return system ? [words, `in ${system}`].filter(Boolean).join(', ') : words
}
