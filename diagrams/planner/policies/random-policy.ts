import { probeKey } from '../../faults/fault-model'
import { refuseReading } from '../../solver/legal-reading'
import { candidateReadings } from '../candidates'
import { workplaceAfter } from '../cost'
import { suspectsLeft, type Policy } from './policy'

/** Any reading that a person might take, all alike. The same seed chooses the same. */
export function randomPolicy(seed: number): Policy {
  return (known) => {
    const { circuit } = known.model
    const taken = new Set(known.readings.map((reading) => probeKey(circuit, reading)))
    const present = workplaceAfter(circuit, known.readings).condition
    const left = candidateReadings(circuit, suspectsLeft(known), present)
      .flatMap((set) => set.probes)
      .filter((probe) => !taken.has(probeKey(circuit, probe)))
    for (let draw = 0; left.length > 0; draw++) {
      const index = Math.floor(unit(seed, known.readings.length, draw) * left.length)
      const [probe] = left.splice(index, 1)
      if (!refuseReading(circuit, probe!)) return probe!
    }
    return null
  }
}

/** A figure from 0 up to 1 out of three whole numbers (a step of mulberry32 over their mixture). */
function unit(seed: number, turn: number, draw: number): number {
  const state =
    (Math.imul(seed, 0x9e3779b1) + Math.imul(turn + 1, 0x85ebca6b) + Math.imul(draw, 0xc2b2ae35)) | 0
  let t = Math.imul(state ^ (state >>> 15), state | 1)
  t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
  return ((t ^ (t >>> 14)) >>> 0) / 4294967296
}
