import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Circuit, ControlsSetting } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { sitesOf } from '@/diagrams/document/sites'
import { layoutFaults } from '@/diagrams/drawing/layout-faults'
import { sampleDocuments, samples } from '@/diagrams/samples/all-samples'
import { solveOperatingPoint, type OperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

function operate(circuit: Circuit, controls: ControlsSetting, fault?: PlantedFault): OperatingPoint {
  const solved = solveOperatingPoint(circuit, { ...restCondition, controls }, fault)
  if (!solved.ok) throw new Error(`${circuit.title}: ${solved.problem.message}`)
  return solved.value
}

function named(title: string): Circuit {
  const found = samples.find((circuit) => circuit.title === title)
  if (!found) throw new Error(`no sample "${title}"`)
  return found
}

const working = (point: OperatingPoint) =>
  [...point.loads]
    .filter(([, load]) => load.works)
    .map(([id]) => id)
    .toSorted()
const pulledIn = (point: OperatingPoint) =>
  [...point.relays]
    .filter(([, on]) => on)
    .map(([id]) => id)
    .toSorted()

describe('every sample', () => {
  it.each(sampleDocuments.map((document) => [document.title, document] as const))(
    '%s opens',
    (_, document) => {
      expect(openCircuit(document)).toMatchObject({ ok: true })
    },
  )

  it.each(samples.map((circuit) => [circuit.title, circuit] as const))(
    '%s is laid out with nothing on top of anything',
    (_, circuit) => expect(layoutFaults(circuit)).toEqual([]),
  )

  it.each(samples.map((circuit) => [circuit.title, circuit] as const))(
    '%s says how it works, step by step, with a code and its places',
    (_, circuit) => {
      expect(circuit.operation.length).toBeGreaterThan(150)
      expect(circuit.sequence.length).toBeGreaterThan(1)
      expect(circuit.codes.every((code) => code.sites.length > 0 && code.setWhen && code.firstChecks)).toBe(
        true,
      )
      expect(circuit.connectors.every((connector) => connector.location && connector.cavities)).toBe(true)
      expect(circuit.wires.every((wire) => wire.colour && wire.signal)).toBe(true)
    },
  )

  it.each(samples.map((circuit) => [circuit.title, circuit] as const))(
    '%s settles in every combination of its controls and no fuse carries more than it may for long',
    (_, circuit) => {
      for (const controls of controlCombinations(circuit, 200)) {
        const point = operate(circuit, controls)
        expect(point.blown).toEqual([])
        for (const node of circuit.nodes) {
          if (node.kind !== 'fuse') continue
          const wire = circuit.wires.find((one) => one.from === `${node.id}.out`)
          // Four fifths of the rating is what a fuse is chosen to carry without end.
          expect(Math.abs(point.wireAmps.get(wire?.id ?? '') ?? Number.NaN)).toBeLessThan(0.8 * node.amps)
        }
      }
    },
  )

  it.each(samples.map((circuit) => [circuit.title, circuit] as const))(
    '%s has no idle wire: an open one shows somewhere, unless it only serves the diagnostic connector',
    (_, circuit) => {
      const combinations = controlCombinations(circuit, 200)
      const silent = circuit.wires
        .filter((wire) => !wire.from.startsWith('dlc.') && !wire.to.startsWith('dlc.'))
        .filter(
          (wire) =>
            !combinations.some((controls) => {
              const good = operate(circuit, controls)
              const bad = operate(circuit, controls, { site: `wire:${wire.id}`, mode: 'open' })
              return (
                [...good.volts].some(([at, volts]) => Math.abs(volts - (bad.volts.get(at) ?? 0)) > 0.4) ||
                working(good).join() !== working(bad).join()
              )
            }),
        )
        .map((wire) => wire.id)
      expect(silent).toEqual([])
    },
  )

  it.each(samples.map((circuit) => [circuit.title, circuit] as const))(
    '%s has wires that can touch a neighbour',
    (_, circuit) => {
      expect(sitesOf(circuit).some((site) => site.modes.includes('short-to-wire'))).toBe(true)
    },
  )

  it('shares the connectors of its vehicle, the same entry in each circuit', () => {
    const seen = new Map<string, string>()
    let shared = 0
    for (const circuit of samples)
      for (const connector of circuit.connectors) {
        const key = `${circuit.vehicle} ${connector.id}`
        const text = JSON.stringify(connector)
        if (seen.has(key)) {
          shared++
          expect(text, key).toBe(seen.get(key))
        }
        seen.set(key, text)
      }
    expect(shared).toBeGreaterThanOrEqual(3)
  })

  it('gives no cavity of a vehicle to two signals', () => {
    const carries = new Map<string, string>()
    for (const circuit of samples)
      for (const wire of circuit.wires)
        for (const end of [wire.from, wire.to]) {
          const [id, port] = end.split('.') as [string, string]
          const node = circuit.nodes.find((one) => one.id === id)
          const pin = node?.kind === 'module' ? `${node.connector} ${port}` : null
          const cavity = node?.kind === 'cavity' ? `${node.connector} ${node.number}` : pin
          if (!cavity) continue
          const key = `${circuit.vehicle}: ${cavity}`
          expect(carries.get(key) ?? wire.signal, key).toBe(wire.signal)
          carries.set(key, wire.signal)
        }
  })
})

describe('what each sample does', () => {
  it('the lamp request is high with the key on and low with it off', () => {
    const link = named('Load space lamp request')
    expect(operate(link, { key: 'on' }).sees.get('body.5')).toBe('high')
    expect(operate(link, { key: 'off' }).sees.get('body.5')).toBe('low')
    expect(operate(link, { key: 'on' }).volts.get('body.5')).toBeGreaterThan(12.3)
  })

  it('the tailgate button pulls 5 V to almost nothing, at about 5 mA', () => {
    const button = named('Tailgate release button')
    expect(operate(button, {}).volts.get('sw2.a')).toBeCloseTo(5, 2)
    const held = operate(button, { button: 'held' })
    expect(held.volts.get('bcm.18')).toBeLessThan(0.05)
    expect(held.wireAmps.get('w3')).toBeCloseTo(0.005, 3)
    expect(held.sees.get('bcm.18')).toBe('low')
  })

  it('the fan runs slowly through R1 when warm, fast when hot, and not at all with the key off', () => {
    const fan = named('Two-speed cooling fan')
    const warm = operate(fan, { key: 'on', coolant: 'warm' })
    const hot = operate(fan, { key: 'on', coolant: 'hot' })
    expect([pulledIn(warm), working(warm)]).toEqual([['k1'], ['m1']])
    expect([pulledIn(hot), working(hot)]).toEqual([['k2'], ['m1']])
    expect(warm.wireAmps.get('w17')).toBeCloseTo(11.4, 0)
    expect(hot.wireAmps.get('w17')).toBeCloseTo(17.8, 0)
    expect(working(operate(fan, { key: 'off', coolant: 'hot' }))).toEqual([])
  })

  it('the trailer lights its tail lamps with the lights and its stop lamps with the brake', () => {
    const trailer = named('Trailer stop and tail lamps')
    expect(working(operate(trailer, {}))).toEqual([])
    expect(working(operate(trailer, { lights: 'on' }))).toEqual(['e3', 'e4'])
    expect(working(operate(trailer, { brake: 'held' }))).toEqual(['e1', 'e2'])
    const all = operate(trailer, { lights: 'on', brake: 'held' })
    expect(working(all)).toEqual(['e1', 'e2', 'e3', 'e4'])
    expect(all.wireAmps.get('w15')).toBeCloseTo(4.2, 1)
  })

  it('the trailer without its ground lights nothing and its ground splice stands at battery voltage', () => {
    const trailer = named('Trailer stop and tail lamps')
    const lost = operate(trailer, { lights: 'on' }, { site: 'part:g9', mode: 'open' })
    expect(working(lost)).toEqual([])
    expect(lost.volts.get('s9.s')).toBeGreaterThan(12)
  })

  it('the fuel sender gives 4 V full and 1 V low', () => {
    const sender = named('Fuel level sender')
    expect(operate(sender, { key: 'on', tank: 'full' }).volts.get('ic.23')).toBeCloseTo(4, 1)
    expect(operate(sender, { key: 'on', tank: 'low' }).volts.get('ic.23')).toBeCloseTo(1, 1)
    const open = operate(sender, { key: 'on' }, { site: 'wire:w5', mode: 'open' })
    expect(open.volts.get('ic.23')).toBeCloseTo(5, 1)
  })

  it('the bus rests near 2.5 V and stands at 3.5 and 1.5 V while driven', () => {
    const bus = named('Bus pair and diagnostic connector')
    const quiet = operate(bus, { key: 'on' })
    const driven = operate(bus, { key: 'on', bus: 'driven' })
    for (const cavity of ['dlc.6', 'dlc.14']) expect(quiet.volts.get(cavity)).toBeCloseTo(2.5, 1)
    expect(driven.volts.get('dlc.6')).toBeCloseTo(3.5, 0)
    expect(driven.volts.get('dlc.14')).toBeCloseTo(1.5, 0)
    expect(operate(bus, { key: 'off' }).volts.get('dlc.6')).toBeCloseTo(0, 3)
    expect(quiet.volts.get('dlc.16')).toBeGreaterThan(12.5)
  })

  it('the window motor turns either way and has both ends grounded at rest', () => {
    const window = named('Left front window motor')
    const motor = (position: string) => {
      const point = operate(window, { key: 'on', window: position })
      return { relays: pulledIn(point), works: working(point), amps: point.wireAmps.get('w9') ?? 0 }
    }
    expect(motor('rest')).toMatchObject({ relays: [], works: [] })
    expect(motor('up')).toMatchObject({ relays: ['k8'], works: ['m4'] })
    expect(motor('down')).toMatchObject({ relays: ['k9'], works: ['m4'] })
    expect(motor('up').amps).toBeCloseTo(8.5, 0)
    expect(motor('down').amps).toBeCloseTo(-motor('up').amps, 1)
  })

  it('the mirrors heat while the timer runs and the key is on, whether or not the button is held', () => {
    const mirrors = named('Heated mirrors')
    for (const button of ['released', 'held']) {
      const running = operate(mirrors, { key: 'on', timer: 'running', button })
      expect([pulledIn(running), working(running)]).toEqual([['k5'], ['e7', 'e8']])
    }
    expect(working(operate(mirrors, { key: 'on', timer: 'idle' }))).toEqual([])
    expect(working(operate(mirrors, { key: 'off', timer: 'running' }))).toEqual([])
    expect(operate(mirrors, { key: 'on', button: 'held' }).sees.get('cab.12')).toBe('low')
  })

  it('follows its own sequence: every step can be set and settles', () => {
    for (const circuit of samples) for (const step of circuit.sequence) operate(circuit, step.controls)
  })
})
