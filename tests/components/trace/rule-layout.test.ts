import { describe, expect, it } from 'vitest'
import { ruleCut } from '@/components/trace/rule/rule-cut'
import { layRule, type RulePlace } from '@/components/trace/rule/rule-layout'

const legs = [
  { name: 'Feed', sites: ['a', 'b'] },
  { name: 'Coil leg', sites: Array.from({ length: 8 }, (_, at) => `c${at}`) },
  { name: 'Lamp leg', sites: Array.from({ length: 20 }, (_, at) => `l${at}`) },
]
const everything = legs.flatMap((leg) => leg.sites)
const places = (left: Record<string, number>): Map<string, RulePlace> =>
  new Map(
    everything.map((site) => [
      site,
      { verdict: site in left ? 'in-question' : 'proved-good', probability: left[site] ?? 0 },
    ]),
  )
const cellsOf = (layout: ReturnType<typeof layRule>) =>
  layout.legs.flatMap((leg) => leg.entries.flatMap((entry) => (entry.kind === 'cell' ? [entry] : [])))
const totalWidth = (layout: ReturnType<typeof layRule>) =>
  layout.legs.reduce((sum, leg) => sum + leg.width, 0) + 12 * (layout.legs.length - 1) + layout.moreWidth

describe('the split rule', () => {
  it('shows every place alike before the first reading', () => {
    const layout = layRule(legs, null, 900)
    expect(layout.legs.flatMap((leg) => leg.entries.map((entry) => entry.kind))).toEqual([
      'unmarked',
      'unmarked',
      'unmarked',
    ])
    expect(totalWidth(layout)).toBeCloseTo(900)
  })

  it('draws places left wide by their share, 44 px at least, and those cleared narrow', () => {
    const layout = layRule(legs, places({ c1: 0.7, c2: 0.28, c3: 0.02 }), 900)
    const cells = cellsOf(layout)
    expect(cells.map((cell) => cell.site)).toEqual(['c1', 'c2', 'c3'])
    const [wide, middle, narrow] = cells.map((cell) => cell.width) as [number, number, number]
    expect(wide).toBeGreaterThan(middle)
    expect(middle).toBeGreaterThan(narrow)
    expect(narrow).toBeGreaterThanOrEqual(44)
    expect(totalWidth(layout)).toBeCloseTo(900)
  })

  it('keeps path order whatever the odds', () => {
    const layout = layRule(legs, places({ l3: 0.9, a: 0.05, c7: 0.05 }), 900)
    expect(cellsOf(layout).map((cell) => cell.site)).toEqual(['a', 'c7', 'l3'])
  })

  it('puts the least likely places behind the last cell when they do not fit, and loses none', () => {
    const odds = Object.fromEntries(everything.map((site, at) => [site, 1 / (at + 2)]))
    for (const width of [366, 620, 788, 1076]) {
      const layout = layRule(legs, places(odds), width)
      const cells = cellsOf(layout)
      expect(cells.length + layout.more.length).toBe(everything.length)
      expect(Math.min(...cells.map((cell) => cell.width))).toBeGreaterThanOrEqual(44)
      const least = Math.min(...cells.map((cell) => odds[cell.site] ?? 0))
      expect(Math.max(0, ...layout.more.map((site) => odds[site] ?? 0))).toBeLessThanOrEqual(least)
      expect(totalWidth(layout)).toBeLessThanOrEqual(width + 1)
    }
  })
})

describe('where the next reading cuts the rule', () => {
  const outcome = (about: string, leaves: string[]) => ({ about, leaves, probability: 0.5 })
  it('is between the places of one outcome and those of the other', () => {
    const cut = ruleCut(['a', 'b', 'c'], [outcome('12.6 V', ['c']), outcome('0 V', ['a', 'b'])])
    expect(cut).toMatchObject({ after: 2, before: { about: '0 V' }, beyond: { about: '12.6 V' } })
  })
  it('is nowhere when the outcomes are mixed along the path or share a place', () => {
    expect(ruleCut(['a', 'b', 'c'], [outcome('x', ['a', 'c']), outcome('y', ['b'])])).toBeNull()
    expect(ruleCut(['a', 'b'], [outcome('x', ['a', 'b']), outcome('y', ['b'])])).toBeNull()
    expect(ruleCut(['a'], [outcome('x', ['a']), outcome('y', [])])).toBeNull()
  })
})
