import type { Circuit } from '../document/circuit-schema'
import type { Probe } from '../document/reading-schema'
import { noAlteration, withBlown, type Alteration } from '../solver/alteration'
import { blownFuses, drivingStudies, fuseBranch } from '../solver/blown-fuses'
import { buildNetwork } from '../solver/build-network'
import { Case } from '../solver/case'
import { alterationOf, isShort } from '../solver/fault-alteration'
import { readMeter } from '../solver/meter'
import type { Network } from '../solver/network'
import type { PlantedFault } from '../solver/planted-fault'
import { Study } from '../solver/study'
import { AlikeFaults } from './alike-faults'
import type { Cell } from './meter-resolution'
import { namedConditions, type NamedCondition } from './named-conditions'
import { probeOf, tableColumns, type TableColumn } from './table-columns'
import { tableFaults } from './table-faults'

/** The table in pieces, so that nobody has to hold it: its heads, its rows, what looks alike. */
export type TablePart =
  | {
      part: 'head'
      conditions: NamedCondition[]
      /** Combinations of controls left out, where a circuit has very many. */
      conditionsLeftOut: number
      /** Null, the good circuit, stands first. */
      faults: (PlantedFault | null)[]
      columns: TableColumn[]
    }
  /** One fault in one condition, with the fuses it has blown and a cell for every column. Indexes into the head's lists. */
  | { part: 'row'; condition: number; fault: number; blows: string[]; cells: Cell[] }
  /** Sets of faults that no cell of the table tells apart; the good circuit is among them where a fault does not show. */
  | { part: 'alike'; sets: number[][] }

/** Numbers that studies of one condition may keep before they are made anew: 32 MB. */
const keptNumbers = 4_000_000

/**
 * Every fault of a circuit at every point in every named condition, one row at a time. Cells are what `measure` shows. At
 * any moment one condition is held: one cell per fault and column for the sets that look alike, and solutions up to `keptNumbers`.
 */
export function* faultTable(circuit: Circuit): Generator<TablePart, void, void> {
  const network = buildNetwork(circuit)
  const columns = tableColumns(circuit)
  const { conditions, leftOut } = namedConditions(circuit)
  const planted = [null, ...tableFaults(circuit)]
  const driving = drivingStudies(network)
  // Worked out with the first row of each, so that nobody waits for all of them before seeing any.
  const cases: FaultCase[] = []
  yield {
    part: 'head',
    conditions,
    conditionsLeftOut: leftOut,
    faults: planted,
    columns,
  }
  const alike = new AlikeFaults(planted.length)
  for (const [index, { condition }] of conditions.entries()) {
    const probes = columns.map((column) => probeOf(column, condition))
    const columnsOfCells: Cell[][] = columns.map(() => [])
    // A meter at each point keeps a solution for the next fault; after so many faults they are let go together.
    const together = Math.max(1, Math.floor(keptNumbers / (columns.length * network.size + 1)))
    let study = new Study(network, condition)
    for (const [f, fault] of planted.entries()) {
      const { alteration, severity, blows } = (cases[f] ??= fault
        ? faultCase(network, driving, fault)
        : goodCase)
      if (f % together === 0) study = new Study(network, condition)
      const cells = readRow(new Case(study, alteration), severity, probes)
      cells.forEach((cell, c) => columnsOfCells[c]!.push(cell))
      yield { part: 'row', condition: index, fault: f, blows, cells }
    }
    columnsOfCells.forEach((cells) => alike.split(condition.battery ? 'volts' : 'ohms', cells))
  }
  yield { part: 'alike', sets: alike.alike() }
}

interface FaultCase {
  alteration: Alteration
  severity: number
  blows: string[]
}

const goodCase: FaultCase = { alteration: noAlteration, severity: 0, blows: [] }

/** A fault with the fuses it has blown, in whatever combination of controls it did. */
function faultCase(network: Network, driving: readonly Study[], fault: PlantedFault): FaultCase {
  const severity = fault.volts ?? fault.ohms ?? 0
  const alteration = alterationOf(network, fault)
  // Studies of all combinations, let go with the fault: they would pile up.
  const blows = isShort(fault.mode) ? blownFuses(network, driving, alteration, severity) : []
  return { alteration: withBlown(alteration, blows.map(fuseBranch)), severity, blows }
}

function readRow(given: Case, severity: number, probes: readonly (Probe | null)[]): Cell[] {
  const settled = given.settle(severity)
  return probes.map((probe) => (settled && probe ? readMeter(given, settled, probe) : null))
}
