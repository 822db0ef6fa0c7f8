import type { Selectable } from 'kysely'
import type { Circuit, Connector } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type * as tables from '../tables/circuits'

export interface StoredRows {
  circuit: Pick<Selectable<tables.CircuitsTable>, 'title' | 'vehicle' | 'system' | 'rest'>
  /** In the order of the document, as everything below. */
  connectors: Pick<Selectable<tables.ConnectorsTable>, 'id' | 'label' | 'cavities' | 'rest'>[]
  nodes: Pick<Selectable<tables.CircuitNodesTable>, 'id' | 'kind' | 'label' | 'connector' | 'rest'>[]
  wires: Selectable<tables.CircuitWiresTable>[]
  codes: Pick<Selectable<tables.CircuitCodesTable>, 'code' | 'failure_type' | 'rest'>[]
}

export function connectorOfRow(row: StoredRows['connectors'][number]): Connector {
  return { id: row.id, label: row.label, cavities: row.cavities, ...row.rest }
}

/** The document again. Rows that do not open are a bug of whoever wrote them, so this throws. */
export function circuitOfRows(rows: StoredRows): Circuit {
  const opened = openCircuit({
    format: 'halfsplit-circuit',
    version: 1,
    title: rows.circuit.title,
    vehicle: rows.circuit.vehicle,
    system: rows.circuit.system,
    ...rows.circuit.rest,
    codes: rows.codes.map((row) => ({
      code: row.code,
      ...(row.failure_type === null ? {} : { failureType: row.failure_type }),
      ...row.rest,
    })),
    connectors: rows.connectors.map(connectorOfRow),
    nodes: rows.nodes.map((row) => ({
      id: row.id,
      kind: row.kind,
      label: row.label,
      ...(row.connector === null ? {} : { connector: row.connector }),
      ...row.rest,
    })),
    wires: rows.wires.map((row) => ({
      id: row.id,
      from: `${row.from_node}.${row.from_port}`,
      to: `${row.to_node}.${row.to_port}`,
      colour: row.colour,
      signal: row.signal,
      mm2: row.mm2,
      ...row.rest,
    })),
  })
  if (!opened.ok) {
    const first = opened.problems[0]
    throw new Error(
      `circuit "${rows.circuit.title}" does not open as stored: ${first?.path} ${first?.message}`,
    )
  }
  return opened.value
}
