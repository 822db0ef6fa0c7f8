import { describe, expect, it } from 'vitest'
import type { SiteAnswer } from '@/diagrams/faults/answer'
import { siteSentence } from '@/diagrams/faults/site-sentence'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { ToldStory } from '@/tests/support/told-story'

const line = lampLine()
const readings = ['a', 'b', 'c', 'd'].map((id) => ({ id }))
const site = (change: Partial<SiteAnswer>): Omit<SiteAnswer, 'says'> => ({
  site: 'contact:c1-1',
  verdict: 'in-question',
  firm: false,
  clearedBy: [],
  probability: 0.41,
  modes: [],
  ...change,
})
const mode = (
  name: 'open' | 'resistive' | 'short-to-ground',
  probability: number,
  ohms: number | null = null,
) => ({
  mode: name,
  probability,
  ohms,
  other: null,
  blows: [],
})

describe('a clearance', () => {
  it('names its readings and what it rests on', () => {
    expect(siteSentence(line, readings, 'narrowed', site({ verdict: 'proved-good', clearedBy: ['b'] }))).toBe(
      'C1 cavity 1 proved good by R2, if there is one fault and no reading is wrong.',
    )
    expect(
      siteSentence(line, readings, 'narrowed', site({ verdict: 'proved-good', clearedBy: ['d', 'b'] })),
    ).toBe('C1 cavity 1 proved good by R2 and R4, if there is one fault and no reading is wrong.')
  })
  it('that is firm says that one reading may be left out', () => {
    expect(
      siteSentence(
        line,
        readings,
        'located',
        site({ verdict: 'proved-good', firm: true, clearedBy: ['a', 'b', 'c'] }),
      ),
    ).toBe(
      'C1 cavity 1 proved good by R1, R2 and R3, if there is one fault. It holds with any one reading left out.',
    )
  })
  it('of a place whose faults would not show names no reading', () => {
    expect(siteSentence(line, readings, 'narrowed', site({ site: 'wire:w4', verdict: 'proved-good' }))).toBe(
      'Wire C1 cavity 1 to Lamp a proved good: no fault of it would show in this circuit.',
    )
  })
  it('is withdrawn while a reading fits nothing, and the sentence says so', () => {
    expect(siteSentence(line, readings, 'cannot-be', site({ modes: [mode('open', 0.41)] }))).toBe(
      'C1 cavity 1 in question, 41 % likely: open 41 %. Nothing is proved good while a reading fits no fault.',
    )
  })
  it('in an answer is the one its readings give', () => {
    const story = new ToldStory(line, { site: 'wire:w4', mode: 'open' })
    story.volts('c1-1.b', keyOn)
    story.volts('lamp.a', keyOn)
    const { sites } = story.answer()
    expect(sites.find((each) => each.site === 'part:f1')?.says).toBe(
      'F1 proved good by R1, if there is one fault and no reading is wrong.',
    )
    expect(sites[0]!.says).toMatch(/^Wire C1 cavity 1 to Lamp a faulty, (over )?9\d % likely: open/)
  })
})

describe('a place in question or faulty', () => {
  it('before the first reading says that there is none', () => {
    expect(siteSentence(line, [], 'narrowed', site({}))).toBe('C1 cavity 1: no reading yet.')
  })
  it('says how likely and in which ways, the rarest left out', () => {
    const modes = [mode('resistive', 0.3, 1.83), mode('short-to-ground', 0.11, 0.1), mode('open', 0.001)]
    expect(siteSentence(line, readings, 'narrowed', site({ modes }))).toBe(
      'C1 cavity 1 in question, 41 % likely: bad joint of about 1.8 ohm 30 %, short to ground 11 %.',
    )
  })
  it('leaves out how bad a joint is while it may as well be open', () => {
    const modes = [mode('resistive', 0.3, 42_000), mode('open', 0.11)]
    expect(siteSentence(line, readings, 'narrowed', site({ modes }))).toBe(
      'C1 cavity 1 in question, 41 % likely: bad joint 30 %, open 11 %.',
    )
  })
  it('says under 1 % and over 99 % of what is nearly settled', () => {
    expect(siteSentence(line, readings, 'narrowed', site({ probability: 0.0001 }))).toBe(
      'C1 cavity 1 in question, under 1 % likely.',
    )
    expect(
      siteSentence(
        line,
        readings,
        'located',
        site({ verdict: 'faulty', probability: 0.999, modes: [mode('open', 0.999)] }),
      ),
    ).toBe('C1 cavity 1 faulty, over 99 % likely: open over 99 %.')
  })
})
