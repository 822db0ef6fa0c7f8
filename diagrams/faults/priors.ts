import type { Circuit } from '../document/circuit-schema'
import type { Mode } from '../document/sites'
import type { PriorKind } from './request'

/** Share of vehicles with a complaint and nothing wrong in this circuit. A guess, as are all weights here. */
export const noFaultPrior = 0.1

/**
 * Relative odds of one mode of one site. `trade`: contacts over wires, opens over shorts; weights of
 * the engine's page (no published frequencies found; common practice, no source). `even`: all alike.
 */
export function modeWeight(circuit: Circuit, site: string, mode: Mode, kind: PriorKind): number {
  if (kind === 'even') return 1
  const [what, rest = ''] = site.split(':')
  const nodeId = rest.split('.')[0]!
  switch (what) {
    case 'wire':
      return mode === 'open' ? 1 : mode === 'resistive' ? 0.7 : 0.25
    case 'contact':
      return mode === 'open' ? 3 : 4
    case 'module':
      return 0.3
    case 'pin':
      return mode === 'open' || mode === 'resistive' ? 0.5 : 0.6
  }
  const node = circuit.nodes.find((n) => n.id === nodeId)
  switch (node?.kind) {
    case 'load':
      return mode === 'open' ? 3 : 0.3
    case 'fuse':
      return mode === 'blown' ? 1.5 : 0.5
    case 'relay':
      if (rest.endsWith('.coil')) return mode === 'open' ? 1 : 0.3
      return mode === 'stuck-open' ? 1.2 : mode === 'resistive' ? 1 : 0.5
    case 'ground':
      return mode === 'open' ? 1 : 3
    case 'switch':
      return mode === 'stuck-open' ? 1 : mode === 'resistive' ? 1.2 : 0.5
    case 'splice':
      return mode === 'open' ? 0.5 : 1
    case 'battery':
      return mode === 'weak' ? 1 : mode === 'shorted' ? 0.3 : 0.5
    default:
      return mode === 'shorted' ? 0.3 : 0.5
  }
}
