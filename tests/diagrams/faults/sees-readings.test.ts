import { describe, expect, it } from 'vitest'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import { clearances } from '@/diagrams/faults/clearance'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { madeCircuit, onOff, whenOn } from '../../support/made-circuit'
import { perturbCircuit } from '../../support/perturbed-circuit'
import { plantFault } from '../../support/plant-fault'
import { seededRandom } from '../../support/random'
import { shows, takeReading } from '../../support/take-reading'

/** A button on a pulled-up pin, a switched feed on a pulled-down one, in a module with a feed of its own. */
function inputs(pins: { threshold?: number; resistor?: number } = {}) {
  const { threshold, resistor = 0.001 } = pins
  return madeCircuit(
    [
      { id: 'bat', kind: 'battery' },
      { id: 'f1', kind: 'fuse', amps: 10 },
      { id: 's1', kind: 'splice' },
      { id: 'sw', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('button') }] },
      { id: 'key', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('key') }] },
      { id: 'r', kind: 'resistor', ohms: resistor },
      {
        id: 'm',
        kind: 'module',
        label: 'Module',
        pins: [
          { pin: '1', circuit: { type: 'supply', ohms: 100 } },
          {
            pin: '2',
            circuit: { type: 'pull-up', volts: 5, ohms: 1000 },
            ...(threshold === undefined ? {} : { threshold }),
          },
          { pin: '3', circuit: { type: 'pull-down', ohms: 4700 } },
          { pin: '4', circuit: { type: 'ground' } },
        ],
      },
      { id: 'g1', kind: 'ground' },
      { id: 'g2', kind: 'ground' },
    ],
    [
      'bat.pos > s1.s',
      's1.s > f1.in',
      'f1.out > m.1',
      'm.4 > g1.in',
      'm.2 > r.a',
      'r.b > sw.a',
      'sw.b > g2.in',
      's1.s > key.a',
      'key.b > m.3',
    ],
    { controls: [onOff('button'), onOff('key')] },
  )
}

const on = (control: string): Condition => ({ ...restCondition, controls: { [control]: 'on' } })
const sees = (pin: string, condition: Condition = restCondition): Probe => ({ kind: 'sees', pin, condition })
const reading = (probe: Probe, value: 'high' | 'low', id = 'r1') => ({ id, ...probe, value }) as Reading
const judge = (circuit: ReturnType<typeof inputs>, ...readings: Reading[]) =>
  evaluate({ circuit, readings, codes: [], priors: 'trade' })
const shown = (circuit: ReturnType<typeof inputs>, probe: Probe, fault?: PlantedFault) => {
  const measured = measure(circuit, probe, fault)
  return measured.ok ? measured.value : measured.problem.message
}

describe('what a module sees', () => {
  const circuit = inputs()

  it('is the level of its own pin: pulled up until the button grounds it, pulled down until it is fed', () => {
    expect(shown(circuit, sees('m.2'))).toBe('high')
    expect(shown(circuit, sees('m.2', on('button')))).toBe('low')
    expect(shown(circuit, sees('m.3'))).toBe('low')
    expect(shown(circuit, sees('m.3', on('key')))).toBe('high')
  })

  it('turns at half of the pull-up, or where the pin says', () => {
    // The button through 1,500 ohm: 5 V · 1500 / 2500 = 3 V. Over 2.5 V, under 4 V.
    expect(shown(inputs({ resistor: 1500 }), sees('m.2', on('button')))).toBe('high')
    expect(shown(inputs({ resistor: 1500, threshold: 4 }), sees('m.2', on('button')))).toBe('low')
    // 800 ohm: 2.2 V, under half.
    expect(shown(inputs({ resistor: 800 }), sees('m.2', on('button')))).toBe('low')
    // A pull-down turns at 6 V: the 12.6 V of the feed through 4,700 ohm and as much again is 6.3 V.
    const fed = (ohms: number) =>
      shown(circuit, sees('m.3', on('key')), { site: 'wire:w9', mode: 'resistive', ohms })
    expect(fed(4700)).toBe('high')
    expect(fed(5700)).toBe('low')
  })

  it('comes with what it should be and whether it is', () => {
    const answer = judge(
      circuit,
      reading(sees('m.2', on('button')), 'high', 'r1'),
      reading(sees('m.3', on('key')), 'high', 'r2'),
    )
    expect(answer.readings[0]).toMatchObject({ expected: 'low', agrees: false })
    expect(answer.readings[0]!.says).toMatch(/sees high, it should see low/)
    expect(answer.readings[1]).toMatchObject({ expected: 'high', agrees: true })
  })

  it('leaves what would make it so and clears the rest: high with the button held is an open on the way to ground', () => {
    const answer = judge(circuit, reading(sees('m.2', on('button')), 'high'))
    const verdict = (site: string) => answer.sites.find((each) => each.site === site)!.verdict
    for (const site of ['wire:w5', 'wire:w6', 'wire:w7', 'part:sw.c', 'part:g2', 'part:r', 'pin:m.2'])
      expect(verdict(site), site).toBe('in-question')
    for (const site of ['wire:w8', 'part:key.c', 'pin:m.3', 'wire:w1', 'part:f1', 'wire:w3'])
      expect(verdict(site), site).toBe('proved-good')
    // Shorts of the line would hold it low.
    const line = answer.sites.find((each) => each.site === 'wire:w5')!
    const most = line.modes.toSorted((a, b) => b.probability - a.probability)[0]!
    expect(['open', 'resistive']).toContain(most.mode)
  })

  it('agrees within the tolerances of parts and battery, close to the threshold either level', () => {
    // 980 ohm: 2.475 V of 2.5 V.
    const close = inputs({ resistor: 980 })
    for (const level of ['high', 'low'] as const)
      expect(judge(close, reading(sees('m.2', on('button')), level)).readings[0]!.agrees, level).toBe(true)
    const far = inputs({ resistor: 500 })
    expect(judge(far, reading(sees('m.2', on('button')), 'high')).readings[0]!.agrees).toBe(false)
  })

  it('is low for a pulled-up pin of a module that sleeps, so that its feed stays in question', () => {
    const blown: PlantedFault = { site: 'part:f1', mode: 'blown' }
    expect(shown(circuit, sees('m.2'), blown)).toBe('low')
    const low = judge(circuit, reading(sees('m.2'), 'low'))
    const verdict = (site: string) => low.sites.find((each) => each.site === site)!.verdict
    expect(verdict('part:f1')).toBe('in-question')
    expect(verdict('wire:w5')).toBe('in-question')
    // Seen high, the module is awake: its feed cannot be open.
    const high = judge(circuit, reading(sees('m.2'), 'high'))
    const modesLeft = high.sites.find((each) => each.site === 'part:f1')!.modes
    expect(modesLeft.find((mode) => mode.mode === 'blown')!.probability).toBeLessThan(0.001)
  })

  it('never clears the true place, taken on real vehicles in every ordinary condition', () => {
    const random = seededRandom(31).next
    const conditions = [restCondition, on('button'), on('key')]
    const probes = conditions.flatMap((condition) => [sees('m.2', condition), sees('m.3', condition)])
    let runs = 0
    for (let round = 0; round < 6; round++)
      for (const drawn of [circuit, inputs({ resistor: 700 })])
        for (const site of sitesOf(drawn))
          for (const mode of site.modes) {
            const fault = plantFault(drawn, site.id, mode, random)
            const vehicle = perturbCircuit(drawn, 11.8 + random(), random)
            if (!shows(drawn, fault) || !shows(vehicle, fault)) continue
            const readings = probes.flatMap(
              (probe, i) => takeReading(`r${i}`, vehicle, probe, fault, random) ?? [],
            )
            const model = faultModelOf(drawn)
            const cleared = clearances(model, weighReadings(model, readings), readings, [site.id]).get(
              site.id,
            )!
            runs++
            expect(cleared.cleared, `${JSON.stringify(fault)} by ${JSON.stringify(readings)}`).toBe(false)
          }
    expect(runs).toBeGreaterThan(300)
  }, 120_000)
})
