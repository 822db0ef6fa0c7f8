import { describe, expect } from 'vitest'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { madeCircuit } from '@/tests/support/made-circuit'
import type { NodeInput } from '@/tests/support/harness-draft'
import { faultyOf, siteOf, ToldStory } from '@/tests/support/told-story'
import { fact } from '@/tests/support/trade-fact'
import { measure } from '@/diagrams/solver/meter'
import { inCondition } from '@/tests/support/made-circuit'

/** A lamp at the end of a feed through eight connectors of one cavity each. */
function longLine(minutes: (connector: number) => number) {
  const numbers = [1, 2, 3, 4, 5, 6, 7, 8]
  const nodes: NodeInput[] = [
    { id: 'bat', kind: 'battery' },
    ...numbers.map((n): NodeInput => ({ id: `v${n}`, kind: 'cavity', connector: `x${n}`, number: 1 })),
    { id: 'lamp', kind: 'load', ohms: 6 },
    { id: 'g', kind: 'ground' },
  ]
  return madeCircuit(
    nodes,
    [
      'bat.pos > v1.a',
      ...numbers.slice(1).map((n) => `v${n - 1}.b > v${n}.a`),
      'v8.b > lamp.a',
      'lamp.b > g.in',
    ],
    { connectors: numbers.map((n) => ({ id: `x${n}`, cavities: 1, accessMinutes: minutes(n) })) },
  )
}

describe('method', () => {
  fact('split', () => {
    const story = new ToldStory(
      longLine(() => 2),
      { site: 'wire:w6', mode: 'open' },
    )
    expect(story.works('lamp')).toBe(false)
    const first = story.answer().next[0]!
    const places = story.circuit.wires.length + 8 + 3
    expect(first.bits).toBeGreaterThan(0.85)
    // Whichever way it falls, what is left is about half.
    const expected = first.outcomes.reduce((sum, each) => sum + each.probability * each.leaves.length, 0)
    expect(expected / places).toBeLessThan(0.75)
  })

  fact('split-weight', () => {
    // The middle of the line lies behind the dashboard.
    const story = new ToldStory(
      longLine((n) => (n === 4 || n === 5 ? 60 : 2)),
      { site: 'wire:w6', mode: 'open' },
    )
    expect(story.works('lamp')).toBe(false)
    const answer = story.answer()
    const leads = answer.next.map((next) => next.red ?? next.wire ?? '')
    expect(leads[0]).toMatch(/^v[2367]\./)
  })

  fact('two-tests', () => {
    const story = new ToldStory(lampLine(), { site: 'wire:w4', mode: 'open' })
    story.works('lamp', keyOn)
    story.volts('c1-1.b', keyOn)
    story.volts('lamp.a', keyOn)
    // One reading says so: with it slipped, another place may be meant.
    expect(faultyOf(story.answer())).toEqual(['wire:w4'])
    const firmAfter = (answer: ReturnType<typeof story.answer>) =>
      answer.sites.filter((site) => site.verdict === 'proved-good' && site.firm).length
    const before = firmAfter(story.answer())
    story.ohms('c1-1.b', 'lamp.a')
    story.ohms('f1.in', 'c1-1.b', keyOn)
    expect(firmAfter(story.answer())).toBeGreaterThan(before)
  })

  fact('verify-repair', () => {
    const story = new ToldStory(lampLine(), { site: 'contact:c1-1', mode: 'resistive', ohms: 2 })
    story.volts('lamp.a', keyOn)
    expect(story.answer().readings[0]!.agrees).toBe(false)
    story.repair()
    const after = new ToldStory(story.circuit)
    after.volts('lamp.a', keyOn)
    after.volts('lamp.b', keyOn)
    after.works('lamp', keyOn)
    after.works('lamp')
    const answer = after.answer()
    expect(answer.readings.every((reading) => reading.agrees)).toBe(true)
    expect(siteOf(answer, 'contact:c1-1').verdict).toBe('proved-good')
    expect(answer.noFault).toBeGreaterThan(0.6)
  })
})

describe('what fails most', () => {
  const start = new ToldStory(lampLine()).answer()
  const chance = (site: string) => siteOf(start, site).probability
  const ofModes = (site: string, ...modes: string[]) =>
    siteOf(start, site)
      .modes.filter((mode) => modes.includes(mode.mode))
      .reduce((sum, mode) => sum + mode.probability, 0)

  fact('joints-commonest', () => {
    const joints = start.sites.filter((site) => /^(contact|part:g)/.test(site.site))
    const all = start.sites.reduce((sum, site) => sum + site.probability, 0)
    expect(joints.reduce((sum, site) => sum + site.probability, 0)).toBeGreaterThan(all / 2)
  })

  fact('opens-over-shorts', () => {
    for (const wire of ['wire:w3', 'wire:w4'])
      expect(ofModes(wire, 'open', 'resistive')).toBeGreaterThan(ofModes(wire, 'short-to-ground'))
    expect(ofModes('part:lamp', 'open')).toBeGreaterThan(ofModes('part:lamp', 'shorted'))
  })

  fact('wire-rarely', () => {
    for (const wire of ['wire:w3', 'wire:w4', 'wire:w5', 'wire:w6'])
      for (const joint of ['contact:c1-1', 'contact:c1-2', 'part:g1'])
        expect(chance(joint), `${joint} over ${wire}`).toBeGreaterThan(chance(wire))
  })

  fact('low-voltage-joints', () => {
    // 24 W at 12.6 V and at 25.2 V, the same ohm in the feed.
    const lost = (batteryVolts: number, ohms: number) => {
      const circuit = madeCircuit(
        [
          { id: 'bat', kind: 'battery', volts: batteryVolts },
          { id: 'lamp', kind: 'load', ohms },
          { id: 'g', kind: 'ground' },
        ],
        ['bat.pos > lamp.a', 'lamp.b > g.in'],
      )
      const read = measure(
        circuit,
        { kind: 'volts', red: 'lamp.a', black: 'lamp.b', condition: inCondition() },
        { site: 'wire:w1', mode: 'resistive', ohms: 1 },
      )
      if (!read.ok) throw new Error(read.problem.message)
      return 1 - Number(read.value) / batteryVolts
    }
    expect(lost(12.6, 6.6) / lost(25.2, 26.5)).toBeGreaterThan(3)
  })

  fact('fuse-open-cause', () => {
    const shorted = new ToldStory(lampLine(), { site: 'wire:w3', mode: 'short-to-ground', ohms: 0.05 })
    expect(shorted.volts('f1.in')).toBeGreaterThan(12.5)
    expect(shorted.volts('f1.out')).toBeLessThan(0.01)
    // The wire with both its ends free.
    expect(shorted.ohms('c1-1.a', 'chassis', { unplugged: ['c1'] })).toBeLessThan(0.1)
    const cause = shorted.answer()
    expect(cause.outcome).toBe('located')
    expect(faultyOf(cause)).toContain('wire:w3')
    expect(faultyOf(cause)).not.toContain('part:f1')
    expect(siteOf(cause, 'wire:w3').modes[0]).toMatchObject({ mode: 'short-to-ground', blows: ['f1'] })
    expect(cause.says).toContain('the short is the cause, the fuse the consequence')

    const alone = new ToldStory(lampLine(), { site: 'part:f1', mode: 'blown' })
    alone.volts('f1.in')
    alone.volts('f1.out')
    alone.ohms('f1.out', 'chassis')
    alone.ohms('c1-1.a', 'chassis', { ...keyOn, unplugged: ['c1'] })
    alone.ohms('c1-1.b', 'chassis', { ...keyOn, unplugged: ['c1'] })
    const fuse = alone.answer()
    expect(fuse.sites[0]!.site).toBe('part:f1')
    expect(siteOf(fuse, 'wire:w3').verdict).toBe('proved-good')
  })
})
