import { readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { samples } from '@/diagrams/samples/all-samples'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { seededRandom } from '../support/random'
import { takeReading } from '../support/take-reading'
import { traceFault } from '../support/trace-fault'

const fixture = path.join(import.meta.dirname, '../fixtures/example-request.jsonl')
const lampLine = samples.find((sample) => sample.title === 'Load space lamp request')!

const on: Condition = { ...restCondition, controls: { key: 'on' } }
const dead = (...unplugged: string[]): Condition => ({ ...restCondition, battery: false, unplugged })

/** Readings of a real fault, measured by the solver, no meter error. */
function read(circuit: Circuit, fault: PlantedFault | undefined, probes: Probe[]): Reading[] {
  return probes.map((probe, i) => takeReading(`r${i + 1}`, circuit, probe, fault, () => 0.5)!)
}

function judge(circuit: Circuit, readings: Reading[], priors: 'trade' | 'even' = 'trade'): Answer {
  return evaluate({ circuit, readings, codes: [], priors })
}

const faulty = (answer: Answer) =>
  answer.sites.filter((site) => site.verdict === 'faulty').map((site) => site.site)
const siteOf = (answer: Answer, id: string) => answer.sites.find((site) => site.site === id)!

describe('the example request', () => {
  const opened = openEvaluationRequest(JSON.parse(readFileSync(fixture, 'utf8').trim()))
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))

  for (const priors of ['trade', 'even'] as const)
    it(`locates the open in wire w5 with ${priors} priors`, () => {
      const answer = evaluate({ ...opened.value, priors })
      expect(answer.outcome).toBe('located')
      expect(faulty(answer)).toEqual(['wire:w5'])
      expect(answer.sites[0]!.modes[0]).toMatchObject({ mode: 'open', other: null, ohms: null, blows: [] })
      expect(answer.readings.map((reading) => reading.agrees)).toEqual([false, true, true])
      expect(siteOf(answer, 'contact:c7-2')).toMatchObject({ verdict: 'proved-good' })
      expect(answer.says).toContain('Open in wire C7 cavity 2 to Body module pin 12.')
    })

  it('gives probabilities that sum to 1 with no fault, most probable site first', () => {
    for (let taken = 0; taken <= 3; taken++) {
      const answer = evaluate({ ...opened.value, readings: opened.value.readings.slice(0, taken) })
      const sum = answer.sites.reduce((total, site) => total + site.probability, answer.noFault)
      expect(sum).toBeCloseTo(1, 9)
      expect(answer.sites.map((s) => s.probability)).toEqual(
        answer.sites.map((s) => s.probability).toSorted((a, b) => b - a),
      )
      for (const site of answer.sites)
        expect(site.modes.reduce((total, mode) => total + mode.probability, 0)).toBeCloseTo(
          site.probability,
          9,
        )
    }
  })

  it('proves nothing and marks nothing before the first reading', () => {
    const answer = evaluate({ ...opened.value, readings: [] })
    expect(answer.outcome).toBe('narrowed')
    expect(new Set(answer.sites.map((site) => site.verdict))).toEqual(new Set(['in-question']))
    expect(answer.next.length).toBeGreaterThan(0)
    expect(answer.next.length).toBeLessThanOrEqual(5)
  })
})

describe('an open and a short found with ohms alone, both ends unplugged', () => {
  const apart = dead('bm-a', 'cm-a')
  const endToEnd: Probe = { kind: 'ohms', red: 'cab.7', black: 'body.5', condition: apart }
  const toChassis: Probe = { kind: 'ohms', red: 'body.5', black: 'chassis', condition: apart }
  const toNeighbour: Probe = { kind: 'ohms', red: 'body.5', black: 'body.6', condition: apart }
  const half: Probe = { kind: 'ohms', red: 'cab.7', black: 'c12-3.a', condition: apart }
  const rest: Probe = { kind: 'ohms', red: 'c12-3.b', black: 'body.5', condition: apart }

  it('locates the open wire', () => {
    const readings = read(lampLine, { site: 'wire:w6', mode: 'open' }, [
      endToEnd,
      toChassis,
      toNeighbour,
      half,
      rest,
    ])
    expect(readings.map((reading) => reading.value).slice(0, 3)).toEqual(['OL', 'OL', 'OL'])
    const answer = judge(lampLine, readings)
    expect(answer.outcome).toBe('located')
    expect(faulty(answer)).toEqual(['wire:w6'])
    expect(siteOf(answer, 'wire:w5').verdict).toBe('proved-good')
  })

  it('narrows a short to ground to the two halves of the line, and to one of them with the inline connector open', () => {
    const fault: PlantedFault = { site: 'wire:w6', mode: 'short-to-ground', ohms: 0.5 }
    const first = judge(lampLine, read(lampLine, fault, [endToEnd, toChassis]))
    expect(first.outcome).toBe('narrowed')
    expect(
      first.sites
        .slice(0, 2)
        .map((site) => site.site)
        .toSorted(),
    ).toEqual(['wire:w5', 'wire:w6'])
    const opened = dead('bm-a', 'cm-a', 'c12')
    const answer = judge(
      lampLine,
      read(lampLine, fault, [
        endToEnd,
        toChassis,
        { ...toChassis, condition: opened },
        { ...toChassis, red: 'cab.7', condition: opened },
      ]),
    )
    expect(answer.outcome).toBe('located')
    // Touching the ground wire in the next cavity is the same to any meter.
    expect(faulty(answer)).toEqual(['wire:w6', 'wire:w10'])
    expect(siteOf(answer, 'wire:w10').modes[0]!.mode).toBe('short-to-wire')
    expect(answer.sites[0]!.modes[0]!.mode).toBe('short-to-ground')
  })

  it('names both wires of a short to the neighbour', () => {
    const fault: PlantedFault = { site: 'wire:w6', mode: 'short-to-wire', other: 'w8', ohms: 0.2 }
    const opened = dead('bm-a', 'cm-a', 'c12')
    const answer = judge(
      lampLine,
      read(lampLine, fault, [endToEnd, toChassis, toNeighbour, { ...toNeighbour, condition: opened }]),
    )
    expect(answer.outcome).toBe('located')
    expect(faulty(answer).toSorted()).toEqual(['wire:w6', 'wire:w8'])
    expect(siteOf(answer, 'wire:w6').modes[0]).toMatchObject({ mode: 'short-to-wire', other: 'w8' })
    expect(answer.inseparable.some((group) => group.includes('wire:w6') && group.includes('wire:w8'))).toBe(
      true,
    )
  })
})

describe('a short that has blown its fuse', () => {
  it('is the cause, and the fuse the consequence', () => {
    const fault: PlantedFault = { site: 'wire:w4', mode: 'short-to-ground', ohms: 0.05 }
    const run = traceFault(lampLine, lampLine, fault, seededRandom(4).next, 10)
    expect(run.answer.outcome).toBe('located')
    expect(faulty(run.answer)).toContain('wire:w4')
    const mode = siteOf(run.answer, 'wire:w4').modes[0]!
    expect(mode).toMatchObject({ mode: 'short-to-ground', blows: ['f11'] })
    expect(run.answer.says).toContain('F11: the short is the cause, the fuse the consequence')
    expect(faulty(run.answer)).not.toContain('part:f11')
  })
})

describe('readings that cannot stand together', () => {
  const probes: Probe[] = [
    { kind: 'volts', red: 'body.5', black: 'chassis', condition: on },
    { kind: 'volts', red: 'c12-3.a', black: 'chassis', condition: on },
    { kind: 'volts', red: 'c12-3.b', black: 'chassis', condition: on },
  ]

  it('names the reading to take again and withdraws every clearance', () => {
    const readings = read(lampLine, { site: 'wire:w5', mode: 'open' }, probes)
    // Side b at battery voltage with no feed on side a and none at the pin: no single fault does that.
    readings[2] = { ...readings[2]!, value: 12.5 } as Reading
    const answer = judge(lampLine, readings)
    expect(answer.outcome).toBe('cannot-be')
    expect(answer.reading).toBe('r3')
    expect(answer.sites.every((site) => site.verdict === 'in-question')).toBe(true)
    expect(answer.says).toContain('R3 fits no fault in this circuit')
  })

  it('takes a value above any source for a slip', () => {
    const readings = read(lampLine, undefined, probes)
    readings[1] = { ...readings[1]!, value: 124.5 } as Reading
    const answer = judge(lampLine, readings)
    expect(answer).toMatchObject({ outcome: 'cannot-be', reading: 'r2' })
    expect(answer.readings[1]!.says).toContain('above any source')
  })

  it('ends a pair of faults in cannot-be', () => {
    const line = read(lampLine, { site: 'wire:w5', mode: 'open' }, [
      { ...probes[1]!, red: 'cab.7' } as Probe,
      probes[1]!,
    ])
    const feed = read(lampLine, { site: 'wire:w8', mode: 'open' }, [
      { ...probes[1]!, red: 'c12-4.b' } as Probe,
      { ...probes[1]!, red: 'body.6' } as Probe,
    ])
    const answer = judge(
      lampLine,
      [...line, ...feed].map((reading, i) => ({ ...reading, id: `r${i}` })),
    )
    expect(answer.outcome).toBe('cannot-be')
  })
})

describe('nothing wrong', () => {
  it('ends in no-fault when the readings the planner asks for all agree', () => {
    for (const circuit of samples) {
      const run = traceFault(circuit, circuit, undefined, seededRandom(9).next, 30)
      expect(run.answer.outcome, circuit.title).toBe('no-fault')
      expect(run.answer.readings.every((reading) => reading.agrees)).toBe(true)
    }
  }, 120_000)
})

describe('clearances', () => {
  it('name readings that suffice on their own', () => {
    const fault: PlantedFault = { site: 'contact:c12-3', mode: 'open' }
    const { readings, answer } = traceFault(lampLine, lampLine, fault, seededRandom(2).next, 8)
    const good = answer.sites.filter((site) => site.verdict === 'proved-good')
    expect(good.length).toBeGreaterThan(5)
    // A place where no fault would show needs no reading to be cleared.
    for (const site of good.filter((s) => s.clearedBy.length > 0)) {
      const again = judge(
        lampLine,
        readings.filter((reading) => site.clearedBy.includes(reading.id)),
      )
      expect(siteOf(again, site.site).verdict, site.site).toBe('proved-good')
    }
  })

  it('are firm only when they hold with any one reading left out', () => {
    const fault: PlantedFault = { site: 'contact:c12-3', mode: 'open' }
    const { readings, answer } = traceFault(lampLine, lampLine, fault, seededRandom(2).next, 8)
    for (const site of answer.sites.filter((s) => s.firm))
      for (const out of readings)
        expect(
          siteOf(
            judge(
              lampLine,
              readings.filter((r) => r !== out),
            ),
            site.site,
          ).verdict,
        ).not.toBe('in-question')
  })
})

describe('every sample', () => {
  it('answers with each of its sites once, whatever is read', () => {
    for (const circuit of samples) {
      const sites = sitesOf(circuit).map((site) => site.id)
      const answer = judge(circuit, [])
      expect(answer.sites.map((site) => site.site).toSorted()).toEqual(sites.toSorted())
    }
  }, 60_000)

  it('offers next readings that can be taken, with outcomes whose probabilities sum to one', () => {
    for (const circuit of samples) {
      const answer = judge(circuit, [])
      expect(answer.next.length, circuit.title).toBeGreaterThan(0)
      const rates = answer.next.map((next) => next.bits / next.minutes)
      expect(rates).toEqual(rates.toSorted((a, b) => b - a))
      for (const next of answer.next) {
        const sum = next.outcomes.reduce((total, outcome) => total + outcome.probability, 0)
        expect(sum).toBeGreaterThan(0.97)
        expect(sum).toBeLessThan(1 + 1e-9)
        expect(next.says).toMatch(/About \d+ minutes?\.$/)
      }
    }
  }, 60_000)
})
