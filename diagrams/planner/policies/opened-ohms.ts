import type { Probe } from '../../document/reading-schema'
import { candidateReadings } from '../candidates'
import { workplaceAfter } from '../cost'
import { suspectsLeft, type Known } from './policy'

/** Ohms with connectors opened round the places in question: what is left when nothing else tells them apart. */
export function openedOhms(known: Known): Probe[] {
  const { circuit } = known.model
  const present = workplaceAfter(circuit, known.readings).condition
  return candidateReadings(circuit, suspectsLeft(known), present)
    .filter(({ condition }) => condition.unplugged.length > 0)
    .flatMap((set) => set.probes)
}
