import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { pointsOf } from '../document/points'
import type { Probe } from '../document/reading-schema'

/** One thing that can be read in every condition: a point against chassis, a load, an input of a module. */
export type TableColumn = { point: string } | { load: string } | { input: string }

/** Points on the harness side, since everything is plugged in; then loads, then inputs. */
export function tableColumns(circuit: Circuit): TableColumn[] {
  return [
    ...pointsOf(circuit)
      .filter((point) => !point.endsWith(':part'))
      .map((point) => ({ point })),
    ...circuit.nodes.flatMap((node) => (node.kind === 'load' ? [{ load: node.id }] : [])),
    ...circuit.nodes.flatMap((node) =>
      node.kind === 'module'
        ? node.pins
            .filter(({ circuit: { type } }) => type === 'pull-up' || type === 'pull-down')
            .map(({ pin }) => ({ input: `${node.id}.${pin}` }))
        : [],
    ),
  ]
}

/** How a column is read in a condition: volts with the battery connected, ohms without; nothing works then. */
export function probeOf(column: TableColumn, condition: Condition): Probe | null {
  if ('point' in column)
    return { kind: condition.battery ? 'volts' : 'ohms', red: column.point, black: 'chassis', condition }
  if (!condition.battery) return null
  return 'load' in column
    ? { kind: 'works', node: column.load, condition }
    : { kind: 'sees', pin: column.input, condition }
}
