import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { tradeFacts } from '@/tests/support/trade-fact'

/** Facts of the trade that the engine need not know, each with the reason. */
const notForTheEngine: Record<string, string> = {
  'recent-change': 'what was touched last is asked of the customer; no reading says it',
  'verify-first':
    'a procedure before the first reading; the order of readings is the planner’s by what they are worth',
  'no-front': 'how a probe is held; the circuit is the same',
  'matching-pin': 'how a probe is held; contact force is felt, not measured',
  'pwm-avg': 'the circuit is solved at rest; nothing in the format pulses',
  'can-sum': 'the two lines pulse; the circuit is solved at rest and has no averages',
  parasitic: 'how much draw is acceptable, and how long modules take to sleep, are rules of time and taste',
  'flash-code': 'counting a flashing lamp is reading a code, which comes in as a code',
  'flash-0': 'counting a flashing lamp is reading a code, which comes in as a code',
  history: 'what to note before the battery is disconnected is a procedure',
  'relay-swap': 'swapping parts is a repair; wiping a socket by pulling the relay is not in the model',
  'coil-spike': 'a pulse at switching off; the circuit is solved at rest',
}

describe('facts of the trade', () => {
  const told = readdirSync(import.meta.dirname)
    .filter((file) => file.endsWith('.test.ts'))
    .flatMap((file) => [
      ...readFileSync(path.join(import.meta.dirname, file), 'utf8').matchAll(/\bfact\('([a-z0-9-]+)'/g),
    ])
    .map((match) => match[1]!)

  it('each have a story here, or a reason why the engine need not know them', () => {
    const missing = tradeFacts.filter(({ id }) => !told.includes(id) && !Object.hasOwn(notForTheEngine, id))
    expect(missing.map(({ id }) => id)).toEqual([])
  })
  it('are told once, and not both told and excused', () => {
    expect(told.length).toBe(new Set(told).size)
    expect(told.filter((id) => Object.hasOwn(notForTheEngine, id))).toEqual([])
    for (const id of Object.keys(notForTheEngine)) expect(tradeFacts.map((each) => each.id)).toContain(id)
  })
})
