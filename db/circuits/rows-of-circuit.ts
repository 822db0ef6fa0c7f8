import type { Insertable } from 'kysely'
import type { Circuit, Connector } from '@/diagrams/document/circuit-schema'
import { connectorName, pointName } from '@/diagrams/document/points'
import { portsOf, splitEnd } from '@/diagrams/document/ports'
import type * as tables from '../tables/circuits'
import { placesOf } from './places-of'
import { codeKey, textKey, wordsOf } from './search-keys'

type Row<T> = Insertable<T>
export interface CircuitKey {
  organisation_id: string
  circuit_id: string
}

/** The rows of a document below its row in `circuits`; connectors are the vehicle's and only referred to. */
export interface CircuitRows {
  connectors: Row<tables.CircuitConnectorsTable>[]
  nodes: Row<tables.CircuitNodesTable>[]
  wires: Row<tables.CircuitWiresTable>[]
  cavities: Row<tables.CircuitCavitiesTable>[]
  places: Row<tables.CircuitPlacesTable>[]
  codes: Row<tables.CircuitCodesTable>[]
  words: Row<tables.CircuitWordsTable>[]
}

export function rowsOfCircuit(circuit: Circuit, key: CircuitKey, vehicleId: string): CircuitRows {
  return {
    connectors: circuit.connectors.map((connector, position) => ({
      ...key,
      position,
      vehicle_id: vehicleId,
      connector: connector.id,
    })),
    nodes: circuit.nodes.map(({ id, kind, label, connector, ...rest }, position) => ({
      ...key,
      id,
      position,
      kind,
      label,
      connector: connector ?? null,
      rest: JSON.stringify(rest),
    })),
    wires: circuit.wires.map(({ id, from, to, colour, signal, mm2, ...rest }, position) => ({
      ...key,
      id,
      position,
      from_node: splitEnd(from).node,
      from_port: splitEnd(from).port,
      to_node: splitEnd(to).node,
      to_port: splitEnd(to).port,
      colour,
      signal,
      mm2,
      rest: JSON.stringify(rest),
    })),
    cavities: circuit.nodes.flatMap((node) =>
      portsOf(node).flatMap((port) =>
        port.connector === null || port.cavity === null
          ? []
          : [
              {
                ...key,
                node: node.id,
                port: port.name,
                vehicle_id: vehicleId,
                connector: port.connector,
                number: port.cavity,
                name: pointName(circuit, `${node.id}.${port.name}`),
              },
            ],
      ),
    ),
    places: placesOf(circuit).map((place) => ({ ...key, ...place })),
    codes: circuit.codes.map(({ code, failureType, ...rest }, position) => ({
      ...key,
      position,
      code,
      failure_type: failureType ?? null,
      code_key: codeKey(code, failureType),
      rest: JSON.stringify(rest),
    })),
    words: wordsOf(searchedText(circuit)).map((word) => ({ ...key, word })),
  }
}

/** What the finder "name" looks through: title, vehicle, system, parts, connectors and signals. */
function searchedText(circuit: Circuit): string {
  return [
    circuit.title,
    circuit.vehicle,
    circuit.system,
    ...circuit.nodes.map((node) => node.label || node.id),
    ...circuit.nodes.flatMap((node) => (node.kind === 'module' ? node.pins.map((pin) => pin.name) : [])),
    ...circuit.connectors.map(connectorName),
    ...circuit.wires.map((wire) => wire.signal),
  ].join(' ')
}

export function connectorRow(
  connector: Connector,
  key: { organisation_id: string; vehicle_id: string },
): Row<tables.ConnectorsTable> {
  const { id, label, cavities, ...rest } = connector
  return {
    ...key,
    id,
    label,
    label_key: textKey(connectorName(connector)),
    cavities,
    rest: JSON.stringify(rest),
  }
}

export function restOf(circuit: Circuit): tables.CircuitRest {
  const { operation, cautions, controls, sequence, annotations } = circuit
  return { operation, cautions, controls, sequence, annotations }
}
