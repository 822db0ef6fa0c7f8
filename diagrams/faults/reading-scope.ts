import type { Network } from '../solver/network'

/** What judging a reading needs to know of its circuit. */
export interface ReadingScope {
  network: Network
}

/** Volts over its own element from which a load works. */
export function loadThreshold(scope: ReadingScope, node: string): number {
  return scope.network.loads.find((load) => load.node === node)!.worksFromVolts
}
