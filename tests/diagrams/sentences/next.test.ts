import { describe, expect, it } from 'vitest'
import { addedWords, conditionParts } from '@/diagrams/document/condition-words'
import { samples } from '@/diagrams/samples/all-samples'
import { evaluate } from '@/diagrams/evaluate'
import { nextWords } from '@/diagrams/planner/wording'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { inCondition } from '@/tests/support/made-circuit'

const line = lampLine()
const outcomes = [
  { about: '12.6 V', low: 11.5, high: 13, probability: 0.5, leaves: ['wire:w4', 'part:lamp'] },
  { about: '0 V', low: 0, high: 0.5, probability: 0.5, leaves: ['wire:w3'] },
]

describe('the next reading', () => {
  it('says place, how, in which condition, what each outcome leaves and how long it takes', () => {
    const probe = { kind: 'volts', red: 'c1-1.b', black: 'chassis', condition: inCondition(keyOn) } as const
    const said = nextWords(line, probe, 3.2, outcomes)
    expect(said).toBe(
      'C1 cavity 1, side b. Back-probe volts to chassis. Key on. 12.6 V leaves 2, 0 V leaves 1. About 3 minutes.',
    )
  })
  it('names what is unplugged, pulled, disconnected and put in', () => {
    const condition = inCondition({
      ...keyOn,
      battery: false,
      unplugged: ['c2', 'f1'],
      added: [
        { from: 'key.in', to: 'key.out', ohms: 0.05 },
        { from: 'lamp.a', to: 'chassis', ohms: 48 },
        { from: 'lamp.a', to: 'lamp.b', ohms: 5.6 },
      ],
    })
    expect(conditionParts(line, condition)).toEqual([
      'Key on',
      'battery disconnected',
      'C2 unplugged',
      'F1 pulled',
      'fused lead from Key in to Key out',
      'test lamp from Lamp a to chassis',
      'stand-in load of 5.6 ohm from Lamp a to Lamp b',
    ])
    expect(addedWords(line, condition.added[0]!)).toBe('fused lead from Key in to Key out')
    const said = nextWords(line, { kind: 'works', node: 'lamp', condition }, 0.7, [])
    expect(said).toContain('C2 unplugged')
    expect(said).toContain('test lamp from Lamp a to chassis')
    expect(said).toMatch(/About 1 minute\.$/)
  })
  it('of every sample says where, what each outcome leaves, and the minutes', () => {
    for (const circuit of samples)
      for (const next of evaluate({ circuit, readings: [], codes: [], priors: 'trade' }).next) {
        expect(next.says, circuit.title).toMatch(/^[A-Z0-9].*\. About \d+ minutes?\.$/)
        for (const outcome of next.outcomes)
          expect(next.says).toContain(`${outcome.about} leaves ${outcome.leaves.length}`)
      }
  }, 60_000)
})
