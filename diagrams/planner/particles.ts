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
const leastMass = 2e-5
/** Severities that all likely hypotheses share, about: the fewer are left, the more finely each is looked at. */
const shared = 160
/** Of one hypothesis at most. */
const mostMarks = 12
/** Severities within a cell: the same for every place, or two that look alike would be told apart by a hair. */
const partsOfCell = 4
/** Below this one severity is enough, from there two, and three where it is likely. */
const coarseBelow = 0.0005
const fineFrom = 0.01

/**
 * Each hypothesis at severities that part its probability evenly; the fewer are likely, the more of them. They
 * lie anywhere in a cell, not in its middle: two places whose severities are not known exactly must not look
 * told apart by figures that only the choice of severities makes different. Weights sum to nearly 1.
 */
export function particlesOf(model: FaultModel, posterior: Posterior): Particle[] {
  const particles: Particle[] = [
    { hypothesis: null, site: noFaultUnit, severity: 0, weight: posterior.noFault },
  ]
  const masses = posterior.cells.map((cells) => cells.reduce((sum, cell) => sum + cell, 0))
  const likely = masses.filter((mass) => mass >= fineFrom).length
  // The same for all that are likely: two places that nothing tells apart must stand for the same severities.
  const finest = Math.max(3, Math.min(mostMarks, Math.round(shared / Math.max(1, likely))))
  model.hypotheses.forEach((hypothesis, h) => {
    const mass = masses[h]!
    if (mass < leastMass) return
    const fixed = hypothesis.cells.every(({ low, high }) => low === high)
    const marks = fixed || mass < coarseBelow ? 1 : mass < fineFrom ? 2 : finest
    const cells = posterior.cells[h]!
    let c = 0
    let before = 0
    for (let m = 0; m < marks; m++) {
      const mark = ((m + 0.5) / marks) * mass
      while (c < cells.length - 1 && before + cells[c]! < mark) before += cells[c++]!
      const { low, high } = hypothesis.cells[c]!
      const part = cells[c]! > 0 ? (mark - before) / cells[c]! : 0.5
      const inside = (Math.min(partsOfCell - 1, Math.floor(partsOfCell * part)) + 0.5) / partsOfCell
      const even = hypothesis.mode === 'weak' || low === 0
      const severity = even ? low + inside * (high - low) : low * (high / low) ** inside
      const last = particles.at(-1)!
      if (last.hypothesis === hypothesis && last.severity === severity) last.weight += mass / marks
      else particles.push({ hypothesis, site: hypothesis.site, severity, weight: mass / marks })
    }
  })
  return particles
}

/** With more particles than this a first look is taken through fewer. */
const fewEnough = 300
/** The likeliest places are looked at whole, of the others as many particles as this. */
const wholeSites = 24
const sampled = 100

/**
 * Fewer particles that stand for all of them: those of the likeliest sites, and of the rest every so-manieth part of
 * their probability. `suspects`: sites, likeliest first. Null when there are few enough as it is.
 */
export function pilotOf(particles: readonly Particle[], suspects: readonly string[]): Particle[] | null {
  if (particles.length <= fewEnough) return null
  const whole = new Set(['', ...suspects.slice(0, wholeSites)])
  const kept = particles.filter((particle) => whole.has(particle.site))
  const others = particles.filter((particle) => !whole.has(particle.site))
  const share = others.reduce((sum, { weight }) => sum + weight, 0) / sampled
  let left = share / 2
  for (const particle of others) {
    left -= particle.weight
    if (left > 0) continue
    const parts = Math.floor(-left / share) + 1
    left += parts * share
    kept.push({ ...particle, weight: parts * share })
  }
  return kept.length < particles.length ? kept : null
}
