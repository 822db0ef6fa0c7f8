import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import { sitesOf } from '../document/sites'

/**
 * Work of an evaluation grows with the square of a circuit's places and with its combinations of controls. Beyond
 * this it would take minutes, and a person should draw the part of the vehicle that is in question instead.
 */
const mostWork = 12e6
/** Combinations of controls gone through at most. */
const mostCombinations = 256

/** Why a circuit is too large to be evaluated, or null. */
export function tooLarge(circuit: Circuit): Problem | null {
  const combinations = Math.min(
    mostCombinations,
    circuit.controls.reduce((product, control) => product * control.positions.length, 1),
  )
  // Places are at least the wires: no need to list them to see that there are far too many.
  const wires = circuit.wires.length
  const places = wires ** 2 * combinations > mostWork ? wires : sitesOf(circuit).length
  if (places ** 2 * combinations <= mostWork) return null
  return {
    path: 'circuit.nodes',
    message:
      `${circuit.nodes.length} parts and ${wires} wires in ${combinations} ${combinations === 1 ? 'combination' : 'combinations'} of controls are too many to evaluate, ` +
      `expected about ${Math.floor(Math.sqrt(mostWork / combinations))} places or fewer: draw the part of the vehicle that is in question as a circuit of its own`,
  }
}
