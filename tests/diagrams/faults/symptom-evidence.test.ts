import { describe, expect, it } from 'vitest'
import { evaluate } from '@/diagrams/evaluate'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Mode } from '@/diagrams/document/sites'
import { FaultModel, faultModelOf } from '@/diagrams/faults/fault-model'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { symptomEvidence } from '@/diagrams/faults/symptom-evidence'
import type { Symptom } from '@/diagrams/faults/symptom-schema'
import { samples } from '@/diagrams/samples/all-samples'
import { madeCircuit, onOff, whenOn } from '../../support/made-circuit'
import { seededRandom } from '../../support/random'
import { traceFault } from '../../support/trace-fault'

const fan = samples.find((sample) => sample.title === 'Two-speed cooling fan')!
const motor = fan.nodes.find((node) => node.kind === 'load')!.id

/** Battery, fuse, switch and lamp in a row, and a second lamp of its own on the same fuse. */
const lamps = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    { id: 'f1', kind: 'fuse', amps: 10 },
    { id: 's1', kind: 'splice' },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('lights') }] },
    { id: 'h1', kind: 'load', ohms: 12, label: 'Left lamp' },
    { id: 'h2', kind: 'load', ohms: 12, label: 'Right lamp' },
    { id: 'g1', kind: 'ground' },
    { id: 'g2', kind: 'ground' },
  ],
  [
    'bat.pos > f1.in',
    'f1.out > s1.s',
    's1.s > sw.a',
    'sw.b > h1.a',
    'h1.b > g1.in',
    's1.s > h2.a',
    'h2.b > g2.in',
  ],
  { controls: [onOff('lights')] },
)

/** Probability that a complaint is told, of a fault of one of the severities that do it, and of those that do not. */
function told(circuit: Circuit, symptom: Symptom, site: string, mode: Mode): number[] {
  const model = faultModelOf(circuit)
  const evidence = symptomEvidence(model, [symptom])!
  const found = model.hypotheses.flatMap((hypothesis, h) =>
    hypothesis.site === site && hypothesis.mode === mode ? [...evidence.cells[h]!] : [],
  )
  return [...new Set(found.map((log) => Number(Math.exp(log).toFixed(9))))].toSorted()
}
const ask = (circuit: Circuit, symptoms: Symptom[]) =>
  evaluate({ circuit, readings: [], codes: [], priors: 'trade', symptoms })

describe('a complaint about a load', () => {
  it('that it does not work is explained by what opens its way, and by nothing of another lamp', () => {
    const dark: Symptom = { node: 'h1', does: 'not-work' }
    for (const [site, mode] of [
      ['wire:w4', 'open'],
      ['part:f1', 'blown'],
      ['part:sw.c', 'stuck-open'],
      ['part:h1', 'open'],
      ['part:g1', 'open'],
    ] as const)
      expect(told(lamps, dark, site, mode), site).toEqual([0.95])
    for (const [site, mode] of [
      ['wire:w6', 'open'],
      ['part:h2', 'open'],
      ['part:sw.c', 'stuck-closed'],
    ] as const)
      expect(told(lamps, dark, site, mode), site).toEqual([0.05])
  })

  it('that it always works is explained by what feeds it with its switch off', () => {
    const lit: Symptom = { node: 'h1', does: 'always' }
    expect(told(lamps, lit, 'part:sw.c', 'stuck-closed')).toEqual([0.95])
    expect(told(lamps, lit, 'wire:w4', 'short-to-supply')).toContain(0.95)
    expect(told(lamps, lit, 'wire:w4', 'open')).toEqual([0.05])
    // A lamp with no switch is always to work.
    expect(told(lamps, { node: 'h2', does: 'always' }, 'part:h2', 'open')).toEqual([0.05])
  })

  it('that it works weakly is explained by a resistance of its own size, not by a small or a great one', () => {
    const dim: Symptom = { node: 'h1', does: 'weakly' }
    expect(told(lamps, dim, 'part:g1', 'resistive')).toEqual([0.05, 0.95])
    expect(told(lamps, dim, 'part:g1', 'open')).toEqual([0.05])
    const model = faultModelOf(lamps)
    const h = model.hypotheses.findIndex((each) => each.site === 'part:g1' && each.mode === 'resistive')
    const { cells } = model.hypotheses[h]!
    const explains = symptomEvidence(model, [dim])!.explains[h]!
    // Volts of the lamp over those it should have, 12 / (12 + R), between 0.2 and 0.9: from 1.3 to 48 ohm.
    cells.forEach(({ low, high }, c) => {
      const ohms = Math.sqrt(low * high)
      if (ohms > 1.5 && ohms < 45) expect(explains[c], `${ohms} ohm`).toBe('1')
      if (ohms < 1.2 || ohms > 52) expect(explains[c], `${ohms} ohm`).toBe('0')
    })
  })

  it('moves the odds, clears nothing, and is in the sentence', () => {
    const answer = ask(lamps, [{ node: 'h1', does: 'not-work' }])
    const plain = ask(lamps, [])
    const of = (site: string, from: typeof answer) =>
      from.sites.find((each) => each.site === site)!.probability
    expect(of('part:h1', answer)).toBeGreaterThan(1.3 * of('part:h1', plain))
    expect(of('part:h2', answer)).toBeLessThan(of('part:h2', plain) / 4)
    expect(answer.noFault).toBeLessThan(plain.noFault / 4)
    expect(answer.noFault).toBeGreaterThan(0)
    expect(answer.sites.every((site) => site.verdict === 'in-question' && site.probability > 0)).toBe(true)
    expect(answer.says).toContain('Told, and weighed with it: Left lamp does not work.')
    expect(plain.says).not.toContain('Told')
  })

  it('told twice is told once', () => {
    const dark: Symptom = { node: 'h1', does: 'not-work' }
    expect(ask(lamps, [dark, dark]).sites).toEqual(ask(lamps, [dark]).sites)
  })

  it('moves the odds to what two dark lamps share', () => {
    const both = ask(lamps, [
      { node: 'h1', does: 'not-work' },
      { node: 'h2', does: 'not-work' },
    ])
    const shared = ['wire:w1', 'part:f1', 'wire:w2', 'part:s1', 'part:bat']
    const held = (answer: typeof both) =>
      answer.sites
        .filter((site) => shared.includes(site.site))
        .reduce((sum, site) => sum + site.probability, 0)
    expect(held(both)).toBeGreaterThan(2 * held(ask(lamps, [])))
    expect(held(both)).toBeGreaterThan(0.65)
  })
})

describe('a complaint about a step', () => {
  const stopsAt = (step: string, site: string, mode: Mode) => told(fan, { step }, site, mode)

  it('is explained by what stops that step and none before it', () => {
    // Step 3: K1 pulls in and the fan runs slowly. Step 4: K2, fast.
    expect(stopsAt('s3', 'part:k1.coil', 'open')).toEqual([0.95])
    expect(stopsAt('s4', 'part:k1.coil', 'open')).toEqual([0.05])
    expect(stopsAt('s4', 'part:k2.coil', 'open')).toEqual([0.95])
    expect(stopsAt('s3', 'part:k2.coil', 'open')).toEqual([0.05])
  })

  it('that changes nothing one could miss says nothing', () => {
    const model = new FaultModel({
      ...fan,
      sequence: [...fan.sequence.slice(0, 1), { ...fan.sequence[0]!, id: 'again' }],
    })
    const { good, cells } = symptomEvidence(model, [{ step: 'again' }])!
    expect(good).toBe(0)
    expect(cells.every((list) => list.every((log) => log === 0))).toBe(true)
  })

  it('is named by its number in the verdict, with what the fault explains', () => {
    const run = traceFault(fan, fan, { site: 'part:k2.coil', mode: 'open' }, seededRandom(3).next, 20)
    const answer = evaluate({
      circuit: fan,
      readings: run.readings,
      codes: [],
      priors: 'trade',
      symptoms: [{ step: 's4' }, { node: motor, does: 'always' }],
    })
    expect(answer.outcome).toBe('located')
    expect(answer.says).toContain('It explains what was told: it stops at step 4.')
    expect(answer.says).toMatch(/It does not explain: .* works where it should not\. Look for that, too\./)
  })
})

describe('a complaint that cannot be taken', () => {
  const refused: [unknown, string, RegExp][] = [
    [[{ node: 'm99', does: 'not-work' }], 'symptoms.0.node', /^load "m99" does not exist$/],
    [[{ node: 'k1', does: 'not-work' }], 'symptoms.0.node', /^"k1" is a relay: expected a load$/],
    [[{ step: 's99' }], 'symptoms.0.step', /^step "s99" does not exist$/],
    [
      [{ step: 's3' }, { step: 's4' }],
      'symptoms.1.step',
      /^stops at step "s4", and at step "s3" before: expected one step$/,
    ],
    [[{ node: motor, does: 'sometimes' }], 'symptoms.0.does', /^"sometimes": expected one of "not-work"/],
    [[{ node: motor }], 'symptoms.0.does', /missing/],
    [[{}], 'symptoms.0', /./],
    ['dark', 'symptoms', /^"dark": expected a list$/],
  ]
  for (const [symptoms, path, message] of refused)
    it(`is refused at ${path}: ${JSON.stringify(symptoms)}`, () => {
      const opened = openEvaluationRequest({ circuit: fan, symptoms })
      if (opened.ok) throw new Error('taken')
      expect(opened.problems[0]!.path).toContain(path.slice(0, 10))
      expect(opened.problems.map((p) => `${p.path} ${p.message}`).join('\n')).toContain(path)
      expect(
        opened.problems.some((p) => message.test(p.message)),
        JSON.stringify(opened.problems),
      ).toBe(true)
    })
})
