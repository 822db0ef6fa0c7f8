import type { Circuit } from '@/diagrams/document/circuit-schema'

/** Pins whose level a module reports in its live data. */
export function moduleInputs(circuit: Circuit): string[] {
  return circuit.nodes.flatMap((node) =>
    node.kind === 'module'
      ? node.pins
          .filter(({ circuit: inside }) => inside.type === 'pull-up' || inside.type === 'pull-down')
          .map(({ pin }) => `${node.id}.${pin}`)
      : [],
  )
}
