import type { Circuit } from '@/diagrams/document/circuit-schema'
import { neighbourWires, type Mode } from '@/diagrams/document/sites'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

/** A fault of a site and mode with a severity drawn log-evenly from the range of the format's page. */
export function plantFault(circuit: Circuit, site: string, mode: Mode, random: () => number): PlantedFault {
  const between = (low: number, high: number) => low * (high / low) ** random()
  const pick = <T>(list: readonly T[]): T => list[Math.floor(random() * list.length)]!
  const fault: PlantedFault = { site, mode }
  switch (mode) {
    case 'open':
    case 'blown':
    case 'stuck-open':
      fault.ohms = between(1e9, 1e12)
      break
    case 'resistive':
      fault.ohms = between(0.5, 1e5)
      break
    case 'weak':
      fault.volts = 7 + random() * 4.8
      break
    case 'short-to-wire':
      fault.other = pick(neighbourWires(circuit, site.slice(5)))
      fault.ohms = between(0.01, 10)
      break
    case 'short-to-ground':
    case 'short-to-supply':
    case 'shorted':
      fault.ohms = between(0.01, 10)
  }
  const splice = circuit.nodes.find((node) => node.kind === 'splice' && `part:${node.id}` === site)
  if (splice) {
    const end = `${splice.id}.s`
    fault.wire = pick(circuit.wires.filter((wire) => wire.from === end || wire.to === end)).id
  }
  return fault
}
