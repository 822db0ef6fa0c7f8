import type { Circuit } from '../document/circuit-schema'
import { neighbourWires, sitesOf } from '../document/sites'
import { plainSeverity } from '../solver/fault-alteration'
import type { PlantedFault } from '../solver/planted-fault'

/**
 * Every way in which every place can fail, each at one plain severity: a splice at the end of each of its wires, a short
 * between wires with each wire beside. In the order of the document.
 */
export function tableFaults(circuit: Circuit): PlantedFault[] {
  return sitesOf(circuit).flatMap(({ id: site, modes }) =>
    modes.flatMap((mode): PlantedFault[] => {
      const fault: PlantedFault =
        mode === 'weak'
          ? { site, mode, volts: plainSeverity(mode) }
          : { site, mode, ohms: plainSeverity(mode) }
      if (mode === 'short-to-wire')
        return neighbourWires(circuit, site.slice('wire:'.length)).map((other) => ({ ...fault, other }))
      const ends = wiresOfSplice(circuit, site)
      return ends.length > 0 ? ends.map((wire) => ({ ...fault, wire })) : [fault]
    }),
  )
}

function wiresOfSplice(circuit: Circuit, site: string): string[] {
  const id = site.startsWith('part:') ? site.slice('part:'.length) : ''
  if (circuit.nodes.find((node) => node.id === id)?.kind !== 'splice') return []
  const end = `${id}.s`
  return circuit.wires.filter((wire) => wire.from === end || wire.to === end).map((wire) => wire.id)
}
