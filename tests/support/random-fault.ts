import type { Circuit } from '@/diagrams/document/circuit-schema'
import { neighbourWires, sitesOf } from '@/diagrams/document/sites'
import { isShort } from '@/diagrams/solver/fault-alteration'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import type { Random } from './random'

/** Any site, any mode of it, any severity the format allows. */
export function randomFault(circuit: Circuit, random: Random): PlantedFault {
  const site = random.pick(sitesOf(circuit))
  const mode = random.pick(site.modes)
  if (mode === 'weak') return { site: site.id, mode, volts: 7 + 4.8 * random.next() }
  if (mode === 'resistive') return { site: site.id, mode, ohms: random.logUniform(0.5, 1e5) }
  if (isShort(mode)) {
    const ohms = random.logUniform(0.01, 10)
    if (mode !== 'short-to-wire') return { site: site.id, mode, ohms }
    return { site: site.id, mode, ohms, other: random.pick(neighbourWires(circuit, site.id.slice(5))) }
  }
  return { site: site.id, mode, ohms: random.logUniform(1e9, 1e11) }
}
