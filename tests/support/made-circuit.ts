import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { solveOperatingPoint, type OperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import type { CircuitInput, NodeInput } from './harness-draft'

type Extra = Omit<Partial<CircuitInput>, 'nodes' | 'wires'>

/**
 * A circuit for a test in few words: its parts, its wires as "from > to" (ids w1, w2, … in order,
 * 1 mohm each so that wiring hardly counts), and what else the document holds.
 */
export function madeCircuit(nodes: NodeInput[], wires: string[], extra: Extra = {}): Circuit {
  const opened = openCircuit({
    format: 'halfsplit-circuit',
    version: 1,
    title: 'made for a test',
    nodes,
    wires: wires.map((text, i) => {
      const [from, to] = text.split(' > ')
      return { id: `w${i + 1}`, from, to, ohms: 0.001 }
    }),
    ...extra,
  })
  if (!opened.ok) throw new Error(JSON.stringify(opened.problems))
  return opened.value
}

export function inCondition(change: Partial<Condition> = {}): Condition {
  return { ...restCondition, ...change }
}

/** The operating point of a circuit that must come to rest. */
export function operate(
  circuit: Circuit,
  change: Partial<Condition> = {},
  fault?: PlantedFault,
): OperatingPoint {
  const solved = solveOperatingPoint(circuit, inCondition(change), fault)
  if (!solved.ok) throw new Error(solved.problem.message)
  return solved.value
}

export const onOff = (id: string) => ({ id, positions: ['off', 'on'], rest: 'off' })
export const whenOn = (control: string) => ({ control, positions: ['on'] })
