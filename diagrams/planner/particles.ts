import type { FaultModel } from '../faults/fault-model'
import type { Hypothesis } from '../faults/hypothesis'
import type { Posterior } from '../faults/posterior'

/** A fault of one definite severity that stands for part of the probability. */
export interface Particle {
  /** Null: no fault. */
  hypothesis: Hypothesis | null
  site: string
  severity: number
  weight: number
}

/** Key of "no fault" among the sites. */
export const noFaultUnit = ''

/** Hypotheses under this probability are left out of planning. */
const least = 2e-5

/** Parts of a hypothesis's probability at which it is represented: the likelier it is, the more finely. */
const marksOf = [[1 / 2], [1 / 4, 3 / 4], [1 / 6, 1 / 2, 5 / 6]] as const

/** One to three severities for each hypothesis. Weights sum to nearly 1. */
export function particlesOf(model: FaultModel, posterior: Posterior): Particle[] {
  const particles: Particle[] = [
    { hypothesis: null, site: noFaultUnit, severity: 0, weight: posterior.noFault },
  ]
  model.hypotheses.forEach((hypothesis, h) => {
    const cells = posterior.cells[h]!
    let mass = 0
    for (const cell of cells) mass += cell
    if (mass < least) return
    const marks = cells.length === 1 || mass < 0.0005 ? marksOf[0] : mass < 0.01 ? marksOf[1] : marksOf[2]
    const chosen = new Map<number, number>()
    let before = 0
    let next = 0
    cells.forEach((cell, c) => {
      before += cell / mass
      while (next < marks.length && marks[next]! <= before + 1e-12) {
        chosen.set(c, (chosen.get(c) ?? 0) + mass / marks.length)
        next++
      }
    })
    for (const [c, weight] of chosen) {
      const { low, high } = hypothesis.cells[c]!
      const severity = hypothesis.mode === 'weak' || low === 0 ? (low + high) / 2 : Math.sqrt(low * high)
      particles.push({ hypothesis, site: hypothesis.site, severity, weight })
    }
  })
  return particles
}
