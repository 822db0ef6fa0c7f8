import type { Mode } from '../document/sites'
import { openOhms } from '../solver/constants'

/**
 * Severities at which a mode is solved; consecutive ones bound a cell. Ohm, or volts of a weak
 * battery. A mode without severity has the single entry 0 and one cell of no width.
 */
export function severityGrid(mode: Mode): readonly number[] {
  switch (mode) {
    case 'open':
    case 'blown':
    case 'stuck-open':
      return opens
    case 'resistive':
      return resistives
    case 'short-to-ground':
    case 'short-to-supply':
    case 'short-to-wire':
    case 'shorted':
      return shorts
    case 'weak':
      return weaks
    default:
      return none
  }
}

function logSteps(low: number, high: number, cells: number): number[] {
  return Array.from({ length: cells + 1 }, (_, i) => low * (high / low) ** (i / cells))
}

const none = [0]
/** An open is 1 Gohm or more; beyond 10 Tohm no meter and no module can tell. */
const opens = [openOhms, 1e10, 1e13]
const resistives = logSteps(0.5, 1e5, 21)
const shorts = logSteps(0.01, 10, 12)
const weaks = [7, 8, 9, 10, 11, 11.8]
