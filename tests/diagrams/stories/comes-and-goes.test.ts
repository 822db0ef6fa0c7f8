import { describe, expect } from 'vitest'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { inCondition } from '@/tests/support/made-circuit'
import { shareOf, siteOf } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'

describe('a fault that comes and goes', () => {
  fact('wiggle', () => {
    // The joint in C1 opens when its harness is bent: good volts before it throughout, after it anything.
    const condition = inCondition(keyOn)
    const beyond = { kind: 'volts', red: 'c1-1.b', black: 'chassis', condition } as const
    const readings = [
      { id: 'r1', kind: 'works', node: 'lamp', condition, value: true } as const,
      {
        id: 'r2',
        kind: 'volts',
        red: 'c1-1.a',
        black: 'chassis',
        condition,
        value: 12.53,
        moved: true,
        low: 12.52,
        high: 12.6,
      } as const,
      { id: 'r3', ...beyond, value: 12.52, moved: true, low: 0, high: 12.53 } as const,
    ].map((reading) => readingSchema.parse(reading))
    const judge = (taken: typeof readings) =>
      evaluate({ circuit: lampLine(), readings: taken, codes: [], priors: 'trade' })
    const answer = judge(readings)
    // Nothing was wrong while it hung still, and yet the readings can stand together.
    expect(answer.outcome).not.toBe('cannot-be')
    expect(answer.outcome).not.toBe('no-fault')
    expect(answer.says).toMatch(/comes and goes/)
    expect(answer.says).toMatch(/0\.00 V to 12\.53 V while the harness was moved/)
    expect(shareOf(answer, ['contact:c1-1'])).toBeGreaterThan(0.9)
    // What was steady while the harness moved is a reading like any other.
    expect(siteOf(answer, 'part:f1').probability).toBeLessThan(0.02)
    // The same two figures as if each had stood there are a misfit or a second fault, not one that comes and goes.
    const standing = judge([
      ...readings.slice(0, 1),
      readingSchema.parse({ id: 'r4', ...beyond, value: 12.52 }),
      readingSchema.parse({ id: 'r5', ...beyond, value: 0 }),
    ])
    expect(standing.says).not.toMatch(/comes and goes/)
  })
})
