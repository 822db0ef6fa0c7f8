import type { ModeAnswer, SiteAnswer } from '@/diagrams/faults/answer'

/** How a place most likely fails. */
export function likeliestMode(site: SiteAnswer): ModeAnswer | undefined {
  return site.modes.toSorted((one, other) => other.probability - one.probability)[0]
}
