import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { innerGround, type Solved } from './plain-solver'

/** Amperes through an element, from its a to its b. */
export function ampsOf({ elements, volts }: Solved, name: string): number {
  const element = elements.find((e) => e.name === name)
  if (!element) return 0
  return (volts(element.a) - volts(element.b) - (element.volts ?? 0)) / element.ohms
}

/** A battery's unwired minus pole is chassis itself. */
export function netOf(circuit: Circuit, point: string): string {
  if (point === 'chassis') return '0'
  const node = circuit.nodes.find((n) => n.id === point.split('.')[0])
  const bonded =
    node?.kind === 'battery' &&
    point.split(/[.:]/)[1] === 'neg' &&
    !circuit.wires.some((w) => w.from === `${node.id}.neg` || w.to === `${node.id}.neg`)
  return bonded ? '0' : point
}

/** What a reading would show, and the sum of amperes-times-volts that its parts move it by (its sensitivity). */
export interface Shown {
  value: number
  low: number
  high: number
  /** Size of one step of the meter's limit. */
  unit: number
  solved: Solved
  /** d value / d ln R of every part. */
  slope(): Map<string, number>
}

export function shownPlainly(
  circuit: Circuit,
  fault: PlantedFault | undefined,
  reading: Reading,
  solved: Solved,
): Shown {
  const { percent, floor } = reading.accuracy ?? {
    percent: reading.kind === 'amps' ? 2 : 0.5,
    floor: reading.kind === 'ohms' ? 0.2 : reading.kind === 'amps' ? 0.05 : 0.02,
  }
  const { volts, perAmpere } = solved
  const slopeBetween = (a: string, b: string, part: number) => () => sensitivities(solved, a, b, part)
  switch (reading.kind) {
    case 'volts': {
      const [a, b] = [netOf(circuit, reading.red), netOf(circuit, reading.black)]
      const y = perAmpere(a, b)
      const part = 1e7 / (1e7 + y(a) - y(b))
      const value = (volts(a) - volts(b)) * part
      return { value, ...around(reading.value, percent, floor), solved, slope: slopeBetween(a, b, part) }
    }
    case 'ohms': {
      const [a, b] = [netOf(circuit, reading.red), netOf(circuit, reading.black)]
      const y = perAmpere(a, b)
      const ohms = Math.max(0, y(a) - y(b))
      const live = Math.abs(volts(a) - volts(b)) > 0.02
      const slope = () => {
        const found = new Map<string, number>()
        // dR/d ln r = r · i², i the current of one ampere.
        for (const [e, { a: p, b: q, ohms: r }] of solved.elements.entries()) {
          const part = solved.parts[e]!
          if (part === null || r === 0) continue
          const amps = (y(p) - y(q)) / r
          found.set(part, (found.get(part) ?? 0) + r * amps * amps)
        }
        return found
      }
      // A source on a dead circuit: the figure means nothing, so anything fits.
      const bounds = live
        ? { low: -Infinity, high: Infinity, unit: 1 }
        : around(reading.value, percent, floor)
      return { value: ohms, ...bounds, solved, slope }
    }
    case 'amps': {
      const element = solved.elements.find((e) => e.name === `W:${reading.wire}`)!
      const value = ampsOf(solved, element.name)
      const whole = slopeBetween(element.a, element.b, 1 / element.ohms)
      const slope = () => {
        const found = whole()
        found.set(element.name, (found.get(element.name) ?? 0) - value)
        return found
      }
      return { value, ...around(reading.value, percent, floor), solved, slope }
    }
    case 'works': {
      const node = circuit.nodes.find((n) => n.id === reading.node)!
      if (node.kind !== 'load') throw new Error(`${node.id} is no load`)
      const at = `part:${node.id}`
      const broken = fault?.site === at && fault.mode !== 'resistive'
      const series = fault?.site === at && fault.mode === 'resistive' ? fault.ohms! : 0
      const element = solved.elements.find((e) => e.name === at)!
      const own = (element.ohms - series) / element.ohms
      const [a, b] = [element.a, element.b]
      const over = volts(a) - volts(b)
      const limit = 12 * node.worksFrom
      return {
        value: broken ? 0 : Math.abs(over) * own,
        ...(reading.value ? { low: limit, high: Infinity } : { low: -Infinity, high: limit }),
        unit: 0.05,
        solved,
        slope: slopeBetween(a, b, broken ? 0 : Math.sign(over) * own),
      }
    }
    case 'sees': {
      const [id, pin] = reading.pin.split('.')
      const node = circuit.nodes.find((n) => n.id === id)!
      if (node.kind !== 'module') throw new Error(`${id} is no module`)
      const found = node.pins.find((one) => one.pin === pin)!
      const inner = found.circuit
      const limit = found.threshold ?? (inner.type === 'pull-up' ? inner.volts / 2 : 6)
      const [a, b] = [`I:${reading.pin}`, innerGround(node)]
      return {
        value: volts(a) - volts(b),
        ...(reading.value === 'high' ? { low: limit, high: Infinity } : { low: -Infinity, high: limit }),
        unit: 0.05,
        solved,
        slope: slopeBetween(a, b, 1),
      }
    }
  }
}

/** The meter's limit is a part of the true value: the true value lies within this. */
function around(value: number | 'OL', percent: number, floor: number) {
  if (value === 'OL') return { low: 40e6, high: Infinity, unit: 4e5 }
  const share = percent / 100
  const low = value >= floor ? (value - floor) / (1 + share) : (value - floor) / (1 - share)
  const high = value >= -floor ? (value + floor) / (1 - share) : (value + floor) / (1 + share)
  return { low, high, unit: share * Math.abs(value) + floor }
}

/** d (v(a) − v(b)) / d ln R of every part, by the adjoint: the part's current times its volts under one ampere. */
function sensitivities({ elements, parts, volts, perAmpere }: Solved, a: string, b: string, scale: number) {
  const y = perAmpere(a, b)
  const found = new Map<string, number>()
  for (const [e, { a: p, b: q, ohms, volts: emf }] of elements.entries()) {
    const part = parts[e]!
    if (part === null || ohms === 0) continue
    const amps = (volts(p) - volts(q) - (emf ?? 0)) / ohms
    found.set(part, (found.get(part) ?? 0) + scale * amps * (y(p) - y(q)))
  }
  return found
}
