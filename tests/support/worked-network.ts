import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { orderElimination } from '@/diagrams/solver/elimination-order'
import { factorise, solveInPlace } from '@/diagrams/solver/factor'
import { operate } from './made-circuit'
import type { NodeInput } from './harness-draft'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

/** Conventions of the fixture: R in ohm, current from a to b; V ideal, a is plus, its current leaves at a. */
export interface WorkedElement {
  id: string
  type: string
  a: string
  b: string
  value: number
}
export interface WorkedNetwork {
  referenceNode: string
  elements: WorkedElement[]
}
export interface WorkedSolution {
  /** Against the reference node. */
  volts(node: string): number
  amps(element: string): number
}

/** Stands in for the nothing that an ideal source has inside. */
const sourceOhms = 1e-9

/** Straight through the elimination and the factor, without a circuit document. */
export function solveByFactor({ referenceNode, elements }: WorkedNetwork): WorkedSolution {
  const names = [...new Set(elements.flatMap((e) => [e.a, e.b]))].filter((name) => name !== referenceNode)
  const unknown = (name: string) => names.indexOf(name)
  const ends = elements.map((e) => [unknown(e.a), unknown(e.b)] as [number, number])
  const order = orderElimination(
    names.length,
    ends.filter(([a, b]) => a >= 0 && b >= 0),
  )
  const edge = new Float64Array(order.neighbour.length)
  const toReference = new Float64Array(names.length)
  const x = new Float64Array(names.length)
  elements.forEach((element, i) => {
    const [a, b] = ends[i]!
    const siemens = 1 / (element.type === 'V' ? sourceOhms : element.value)
    if (a >= 0 && b >= 0) edge[order.slotOf(a, b)]! += siemens
    else toReference[Math.max(a, b)]! += siemens
    if (element.type !== 'V') return
    if (a >= 0) x[a]! += element.value * siemens
    if (b >= 0) x[b]! -= element.value * siemens
  })
  solveInPlace(factorise(order, edge, toReference), x)
  return solution(elements, (name) => (name === referenceNode ? 0 : x[unknown(name)]!))
}

/** Currents of resistors by Ohm, of a source by what the others take at one of its ends. */
function solution(elements: WorkedElement[], volts: (node: string) => number): WorkedSolution {
  const amps = (id: string): number => {
    const e = elements.find((element) => element.id === id)!
    if (e.type !== 'V') return (volts(e.a) - volts(e.b)) / e.value
    const others = (node: string) => elements.filter((o) => o.id !== id && (o.a === node || o.b === node))
    const leaving = (node: string) =>
      others(node).reduce((sum, o) => sum + (o.a === node ? amps(o.id) : -amps(o.id)), 0)
    // What leaves a source at its plus goes into the others there.
    return others(e.a).some((o) => o.type === 'V') ? -leaving(e.b) : leaving(e.a)
  }
  return { volts, amps }
}

/** Next to nothing, so that the joining costs no example a printed digit. */
const joiningWireOhms = 1e-9

/** The same network as a circuit document: batteries and resistors joined at splices, the reference at chassis. */
export function workedCircuit({ referenceNode, elements }: WorkedNetwork): Circuit {
  const names = [...new Set(elements.flatMap((e) => [e.a, e.b]))]
  const nodes: NodeInput[] = names.map((name, i) =>
    name === referenceNode ? { id: `n${i}`, kind: 'ground', ohms: 1e-9 } : { id: `n${i}`, kind: 'splice' },
  )
  const wires: { id: string; from: string; to: string; ohms: number }[] = []
  elements.forEach((element, i) => {
    const id = `e${i}`
    const isSource = element.type === 'V'
    if (isSource) nodes.push({ id, kind: 'battery', volts: Math.abs(element.value), ohms: sourceOhms })
    else nodes.push({ id, kind: 'resistor', ohms: element.value })
    const [plus, minus] = element.value < 0 ? ['neg', 'pos'] : ['pos', 'neg']
    const joint = (name: string) => `n${names.indexOf(name)}.${name === referenceNode ? 'in' : 's'}`
    wires.push(
      { id: `${id}-a`, from: `${id}.${isSource ? plus : 'a'}`, to: joint(element.a), ohms: joiningWireOhms },
      { id: `${id}-b`, from: `${id}.${isSource ? minus : 'b'}`, to: joint(element.b), ohms: joiningWireOhms },
    )
  })
  const opened = openCircuit({
    format: 'halfsplit-circuit',
    version: 1,
    title: 'worked example',
    nodes,
    wires,
  })
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
  return opened.value
}

/** Through the whole solver; `shorted` names an element to short with 10 milliohms. */
export function solveByCircuit(network: WorkedNetwork, shorted?: string): WorkedSolution {
  const { referenceNode, elements } = network
  const names = [...new Set(elements.flatMap((e) => [e.a, e.b]))]
  const place = (id: string) => elements.findIndex((e) => e.id === id)
  const fault: PlantedFault | undefined =
    shorted === undefined ? undefined : { site: `part:e${place(shorted)}`, mode: 'shorted', ohms: 0.01 }
  const point = operate(workedCircuit(network), {}, fault)
  return solution(
    elements,
    (name) => point.volts.get(`n${names.indexOf(name)}.${name === referenceNode ? 'in' : 's'}`)!,
  )
}
