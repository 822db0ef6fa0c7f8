import { readFileSync } from 'node:fs'
import path from 'node:path'
import { it } from 'vitest'

interface TradeFact {
  id: string
  fact: string
  origin: string
}

const file = path.join(import.meta.dirname, '../fixtures/trade-facts.json')
export const tradeFacts: TradeFact[] = JSON.parse(readFileSync(file, 'utf8')).facts

/** A test that tells the story of one fact of the trade; its title is the fact, and where the fact comes from. */
export function fact(id: string, tell: () => void) {
  const found = tradeFacts.find((each) => each.id === id)
  if (!found) throw new Error(`no trade fact "${id}"`)
  it(`${found.fact} (${found.origin})`, tell)
}
