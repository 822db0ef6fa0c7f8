import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { FaultModel } from '@/diagrams/faults/fault-model'
import { posteriorOf } from '@/diagrams/faults/posterior'
import { mostWithLeads, readingsWithLeads } from '@/diagrams/planner/added-leads'
import { freshWorkplace, minutesFor, workplaceAfter } from '@/diagrams/planner/cost'
import { netOf } from '@/diagrams/planner/net-of'
import { particlesOf } from '@/diagrams/planner/particles'
import { leadsAreSafe } from '@/diagrams/planner/safe-leads'
import { conditionWords } from '@/diagrams/planner/wording'
import { samples } from '@/diagrams/samples/all-samples'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { inCondition, madeCircuit, onOff, whenOn } from '../../support/made-circuit'

/** A fan fed through a relay; its plug and the relay's socket can be opened. */
const fan = madeCircuit(
  [
    { id: 'bat', kind: 'battery', x: 0, y: 0 },
    { id: 'f1', kind: 'fuse', amps: 20, x: 0, y: 0 },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('key') }], x: 0, y: 0 },
    { id: 'k1', kind: 'relay', label: 'K1', connector: 'k1-x', x: 0, y: 0 },
    { id: 'm', kind: 'load', label: 'Fan', ohms: 2, connector: 'm-x', x: 0, y: 0 },
    { id: 'g', kind: 'ground', x: 0, y: 0 },
  ],
  [
    'bat.pos > f1.in',
    'f1.out > k1.30',
    'f1.out > sw.a',
    'sw.b > k1.86',
    'k1.85 > g.in',
    'k1.87 > m.a',
    'm.b > g.in',
  ],
  {
    controls: [onOff('key')],
    connectors: [
      { id: 'k1-x', cavities: 5 },
      { id: 'm-x', cavities: 2 },
    ],
  },
)
const bridge = { from: 'k1.30', to: 'k1.87', ohms: 0.05 }

describe('readings with something put in', () => {
  it('bridge a relay in its socket to see whether all but the relay and its coil side is good', () => {
    const sets = readingsWithLeads(fan, ['part:k1.contact'], restCondition)
    const bridged = sets.find(({ condition }) => condition.added.some((lead) => lead.to === bridge.to))!
    expect(bridged.condition.unplugged).toEqual(['k1'])
    expect(bridged.condition.added).toEqual([bridge])
    expect(bridged.probes).toContainEqual({ kind: 'works', node: 'm', condition: bridged.condition })
  })

  it('put a test lamp in place of an unplugged load, and feed that load by itself', () => {
    const added = readingsWithLeads(fan, ['part:m'], restCondition).map(({ condition }) => condition.added)
    expect(added).toContainEqual([{ from: 'm.a', to: 'm.b', ohms: 48 }])
    expect(added).toContainEqual([
      { from: 'bat.pos', to: 'm.a:part', ohms: 0.05 },
      { from: 'm.b:part', to: 'chassis', ohms: 0.05 },
    ])
  })

  it('are legal on every sample for every suspect, and few', () => {
    for (const circuit of samples)
      for (const { id } of sitesOf(circuit)) {
        const sets = readingsWithLeads(circuit, [id], restCondition)
        expect(sets.length).toBeLessThanOrEqual(mostWithLeads)
        for (const { condition, probes } of sets)
          for (const probe of probes) {
            const refused = refuseReading(circuit, probe)
            // What a lead would short is kept out by its current, in the good circuit too.
            if (refused) expect(refused.path, JSON.stringify(condition)).toMatch(/^condition/)
          }
      }
  })

  it('are none on an airbag circuit', () => {
    const guarded = { ...fan, cautions: ['airbag' as const] }
    expect(readingsWithLeads(guarded, ['part:k1.contact', 'part:m'], restCondition)).toEqual([])
    const probe: Probe = {
      kind: 'works',
      node: 'm',
      condition: inCondition({ unplugged: ['k1'], added: [bridge] }),
    }
    expect(refuseReading(guarded, probe)?.message).toContain('airbag')
    expect(refuseReading(fan, probe)).toBeNull()
  })

  it('never feed or ground what a module drives or reads', () => {
    for (const circuit of samples) {
      const suspects = circuit.nodes.flatMap((node) => (node.kind === 'load' ? [`part:${node.id}`] : []))
      for (const { condition } of readingsWithLeads(circuit, suspects, restCondition)) {
        const [lead] = condition.added
        if (condition.unplugged.length > 0 || !lead) continue
        const supplied = lead.to !== 'chassis'
        for (const end of netOf(circuit, supplied ? lead.to : lead.from)) {
          const node = circuit.nodes.find((n) => n.id === end.split('.')[0])!
          if (node.kind !== 'module') continue
          const pin = node.pins.find((p) => p.pin === end.split('.')[1])!
          expect(supplied, end).toBe(false)
          expect(['ground', 'low-side']).toContain(pin.circuit.type)
        }
      }
    }
  })

  it('are not asked for where a suspect would drive more than the lead carries', () => {
    const model = new FaultModel(fan)
    const posterior = posteriorOf(model, weighReadings(model, []), 'trade')
    const particles = particlesOf(model, posterior)
    const condition = inCondition({ controls: { key: 'on' }, unplugged: ['k1'], added: [bridge] })
    const network = buildNetwork(fan, condition.added)
    const bridged = new FaultModel(fan, { network, hypotheses: model.hypotheses })
    const shorted = particles.filter(({ site }) => site === 'part:m')
    const plain = particles.filter(({ site }) => site === 'part:k1.coil' || site === 'contact:k1.85')
    expect(plain.length).toBeGreaterThan(0)
    expect(leadsAreSafe(bridged, condition, plain)).toBe(true)
    // With the fuse still good, a fan that draws too much would draw it through the lead.
    const mild = shorted.filter(
      ({ hypothesis }) => hypothesis?.mode === 'shorted' && hypothesis.blows.length === 0,
    )
    expect(mild.length).toBeGreaterThan(0)
    expect(leadsAreSafe(bridged, condition, mild)).toBe(false)
  })

  it('are refused where the good circuit would drive a supply into ground through a lead', () => {
    const short = inCondition({ added: [{ from: 'bat.pos', to: 'chassis', ohms: 0.05 }] })
    const problem = refuseReading(fan, { kind: 'works', node: 'm', condition: short })
    expect(problem?.path).toBe('condition.added.0')
    expect(problem?.message).toMatch(/would carry 1\d\d A/)
  })

  it('cost a minute a lead and the way to both its ends, once', () => {
    const condition = inCondition({ unplugged: ['k1'], added: [bridge] })
    const probe: Probe = { kind: 'works', node: 'm', condition }
    // ½ for the reading, 1 for the lead, 1 and half of the 2 minutes' access to pull the relay, 2 and 2 to get at
    // the relay and its socket.
    expect(minutesFor(fan, probe, freshWorkplace)).toBeCloseTo(0.5 + 1 + 1 + 1 + 2 + 2)
    expect(minutesFor(fan, probe, workplaceAfter(fan, [probe]))).toBeCloseTo(0.5)
  })

  it('are told in words', () => {
    const condition = inCondition({
      unplugged: ['k1'],
      added: [bridge, { from: 'm.a', to: 'chassis', ohms: 48 }],
    })
    expect(conditionWords(fan, condition)).toBe(
      'K1 pulled, fused lead from K1 30 to K1 87, test lamp from Fan a to chassis',
    )
  })
})
