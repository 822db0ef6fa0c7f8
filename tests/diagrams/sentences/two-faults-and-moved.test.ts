import { describe, expect, it } from 'vitest'
import { type Reading, readingSchema } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { inCondition, madeCircuit } from '@/tests/support/made-circuit'

/** Two lamps from one splice, each with a fuse and a ground of its own: a fault in one branch leaves the other alone. */
const two = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 's', kind: 'splice', label: 'S1' },
    { id: 'f1', kind: 'fuse', amps: 10, label: 'F1' },
    { id: 'f2', kind: 'fuse', amps: 10, label: 'F2' },
    { id: 'left', kind: 'load', ohms: 6, label: 'Left' },
    { id: 'right', kind: 'load', ohms: 6, label: 'Right' },
    { id: 'g1', kind: 'ground', label: 'G1' },
    { id: 'g2', kind: 'ground', label: 'G2' },
  ],
  [
    'bat.pos > s.s',
    's.s > f1.in',
    's.s > f2.in',
    'f1.out > left.a',
    'left.b > g1.in',
    'f2.out > right.a',
    'right.b > g2.in',
  ],
)

describe('two faults', () => {
  const blown: PlantedFault = { site: 'part:f1', mode: 'blown' }
  const poor: PlantedFault = { site: 'part:g2', mode: 'resistive', ohms: 2 }
  const answer = (): Answer => {
    const readings = (
      [
        ['f1.in', blown],
        ['f1.out', blown],
        ['left.a', blown],
        ['f2.out', poor],
        ['right.b', poor],
        ['g2.in', poor],
      ] as const
    ).map(([red, fault], index): Reading => {
      const probe = { kind: 'volts', red, black: 'chassis', condition: inCondition() } as const
      const measured = measure(two, probe, fault)
      if (!measured.ok) throw new Error(measured.problem.message)
      return readingSchema.parse({ id: `r${index + 1}`, ...probe, value: measured.value })
    })
    return evaluate({ circuit: two, readings, codes: [], priors: 'trade' })
  }

  it('are lettered, each with the readings that speak of it', () => {
    const { outcome, says } = answer()
    expect(outcome).toBe('two-faults')
    expect(says).toMatch(
      /^Two faults\. A: Bad joint at G2, about [12](\.\d)? ohm\. B: F1 has blown(, \d\d % likely)?\. R5 and R6 speak of A, R2 and R3 speak of B\. No single fault gives these readings together\.$/,
    )
  })
  it('prove nothing good, and every place says so', () => {
    for (const site of answer().sites.filter((each) => each.verdict === 'in-question'))
      expect(site.says).toMatch(/Nothing is proved good while there are two faults\.$/)
  })
})

describe('a reading with the harness moved', () => {
  const line = lampLine()
  const condition = inCondition(keyOn)
  const moved = (red: string, value: number, low: number, high: number, id = 'r1') =>
    readingSchema.parse({
      id,
      kind: 'volts',
      red,
      black: 'chassis',
      condition,
      value,
      moved: true,
      low,
      high,
    })
  const judge = (...readings: Reading[]) => evaluate({ circuit: line, readings, codes: [], priors: 'trade' })

  it('that swings says from where to where, beside where a good circuit stays, and the verdict says what follows', () => {
    const answer = judge(moved('c1-1.b', 12.5, 0.1, 12.5))
    expect(answer.readings[0]!.says).toBe(
      'C1 cavity 1, side b: went from 0.10 V to 12.50 V while the harness was moved. A good circuit stays at 12.49 V.',
    )
    expect(answer.says).toMatch(
      /\. This fault comes and goes: C1 cavity 1, side b went from 0\.10 V to 12\.50 V while the harness was moved\. Readings may have been taken with it or without it\.$/,
    )
  })
  it('that does not swing says that it stayed', () => {
    const answer = judge(moved('c1-1.b', 12.5, 12.48, 12.52))
    expect(answer.readings[0]!.says).toBe(
      'C1 cavity 1, side b: 12.50 V, as in a good circuit (12.49 V). It stayed so while the harness was moved.',
    )
    expect(answer.says).not.toMatch(/comes and goes/)
  })
})
