import { readFileSync } from 'node:fs'
import path from 'node:path'

const fixture = (name: string) =>
  readFileSync(path.join(import.meta.dirname, '..', '..', 'fixtures', name), 'utf8')

export type Loose = any

/** A fresh copy of the format page's example document, changed as told. */
export function exampleCircuit(change: (circuit: Loose) => void = () => {}): Loose {
  const circuit = JSON.parse(fixture('example-circuit.json')) as Loose
  change(circuit)
  return circuit
}

/** The line of the format page's example request; its fault: wire w5 is open. */
export function exampleRequest(): Loose {
  return JSON.parse(fixture('example-request.jsonl').trim())
}
