import type { Circuit } from '../document/circuit-schema'
import { pointName } from '../document/points'
import { siteName } from '../document/sites'
import type { PlantedFault } from '../solver/planted-fault'
import { faultTable, type TablePart } from './fault-table'
import type { Cell } from './meter-resolution'
import type { TableColumn } from './table-columns'

export const tableFormats = ['csv', 'ndjson'] as const
export type TableFormat = (typeof tableFormats)[number]

/** The fault table as text, a line at a time: for a spreadsheet, or one JSON value a line for a program. */
export function tableLines(circuit: Circuit, format: TableFormat): Generator<string, void, void> {
  return format === 'csv' ? csvLines(circuit) : jsonLines(circuit)
}

/** A row for every fault in every condition, a column for every point; at the end the sets that look alike. */
function* csvLines(circuit: Circuit): Generator<string, void, void> {
  let head: Extract<TablePart, { part: 'head' }> | null = null
  for (const part of faultTable(circuit)) {
    switch (part.part) {
      case 'head':
        head = part
        yield csvLine([
          'condition',
          'place',
          'fault',
          'blows',
          'unit',
          ...part.columns.map((column) => columnName(circuit, column)),
        ])
        break
      case 'row': {
        const { name, condition } = head!.conditions[part.condition]!
        yield csvLine([
          name,
          ...faultWords(circuit, head!.faults[part.fault] ?? null),
          part.blows.map((id) => nodeLabel(circuit, id)).join(' '),
          condition.battery ? 'V' : 'ohm',
          ...part.cells.map((cell) => cellWords(cell, condition.battery ? 2 : 1)),
        ])
        break
      }
      case 'alike':
        if (part.sets.length > 0) yield '\r\n'
        for (const [i, set] of part.sets.entries())
          for (const fault of set)
            yield csvLine([`looks alike ${i + 1}`, ...faultWords(circuit, head!.faults[fault] ?? null)])
        if (head!.conditionsLeftOut > 0)
          yield csvLine([`${head!.conditionsLeftOut} combinations of controls are left out`])
    }
  }
}

function* jsonLines(circuit: Circuit): Generator<string, void, void> {
  for (const part of faultTable(circuit)) yield `${JSON.stringify(part, rounded)}\n`
}

/** A microvolt and a microohm: what the arithmetic has beyond is noise. */
function rounded(_: string, value: unknown): unknown {
  return typeof value === 'number' && !Number.isInteger(value) ? Math.round(value * 1e6) / 1e6 : value
}

function faultWords(circuit: Circuit, fault: PlantedFault | null): string[] {
  if (!fault) return ['none', 'good circuit']
  const beside = fault.other === undefined ? '' : `, ${siteName(circuit, `wire:${fault.other}`)}`
  const at = fault.wire === undefined ? '' : `, ${siteName(circuit, `wire:${fault.wire}`)}`
  const size = fault.ohms !== undefined && sized.has(fault.mode) ? ` ${fault.ohms} ohm` : ''
  return [siteName(circuit, fault.site), `${fault.mode.replaceAll('-', ' ')}${size}${beside}${at}`]
}

/** Modes whose ohms say something: an open one's are as good as any. */
const sized = new Set<string>(['resistive', 'shorted', 'short-to-ground', 'short-to-supply', 'short-to-wire'])

function columnName(circuit: Circuit, column: TableColumn): string {
  if ('point' in column) return pointName(circuit, column.point)
  return 'load' in column
    ? `${nodeLabel(circuit, column.load)} works`
    : `${pointName(circuit, column.input)} sees`
}

function nodeLabel(circuit: Circuit, id: string): string {
  return circuit.nodes.find((node) => node.id === id)?.label || id
}

function cellWords(cell: Cell, decimals: number): string {
  if (cell === null) return ''
  if (typeof cell === 'boolean') return cell ? 'works' : 'does not'
  return typeof cell === 'string' ? cell : cell.toFixed(decimals).replace(/^-(0\.?0*)$/, '$1')
}

function csvLine(cells: readonly string[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`
}

/** A name that begins like a formula must not be one in a spreadsheet; figures stay figures. */
function csvCell(text: string): string {
  const plain = /^[=+\-@\t\r]/.test(text) && !/^-?\d+(\.\d+)?$/.test(text) ? `'${text}` : text
  return /[",\r\n]/.test(plain) ? `"${plain.replaceAll('"', '""')}"` : plain
}
