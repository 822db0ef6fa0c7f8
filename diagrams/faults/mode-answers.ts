import type { Mode } from '../document/sites'
import type { ModeAnswer } from './answer'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { Cell, Hypothesis } from './hypothesis'
import type { Posterior } from './posterior'

interface Entry extends ModeAnswer {
  /** Mass of the likeliest cell and of the likeliest set of blown fuses. */
  cellMass: number
  variantMass: number
  cell: Cell | null
  at: readonly [h: number, c: number]
}

/** The ways in which each site may be at fault, most probable first, with the most likely severity of each. */
export function modeAnswers(
  model: FaultModel,
  posterior: Posterior,
  evidence: Evidence,
): Map<string, ModeAnswer[]> {
  const bySite = new Map<string, Map<string, Entry>>()
  model.hypotheses.forEach((hypothesis, h) => {
    let entries = bySite.get(hypothesis.site)
    if (!entries) bySite.set(hypothesis.site, (entries = new Map()))
    const key = `${hypothesis.mode} ${hypothesis.other}`
    let entry = entries.get(key)
    if (!entry) entries.set(key, (entry = emptyEntry(hypothesis, h)))
    let variant = 0
    hypothesis.cells.forEach((cell, c) => {
      const mass = posterior.cells[h]![c]!
      variant += mass
      if (mass <= entry.cellMass) return
      entry.cellMass = mass
      entry.cell = cell
      entry.at = [h, c]
    })
    entry.probability += variant
    if (variant > entry.variantMass) {
      entry.variantMass = variant
      entry.blows = hypothesis.blows
    }
  })
  return new Map(
    [...bySite].map(([site, entries]) => [
      site,
      [...entries.values()]
        .toSorted((a, b) => b.probability - a.probability)
        .map(({ mode, probability, other, blows, cell, at }) => ({
          mode,
          probability,
          ohms: cell && hasOhms(mode) ? severityIn(cell, evidence.within?.(...at) ?? 0.5) : null,
          other,
          blows,
        })),
    ]),
  )
}

function emptyEntry({ mode, other, blows }: Hypothesis, h: number): Entry {
  return {
    mode,
    probability: 0,
    ohms: null,
    other,
    blows,
    cellMass: -1,
    variantMass: -1,
    cell: null,
    at: [h, 0],
  }
}

function severityIn({ low, high }: Cell, part: number): number {
  return low * (high / low) ** part
}

function hasOhms(mode: Mode): boolean {
  return mode === 'resistive' || mode.startsWith('short')
}
