import type { Circuit } from '../document/circuit-schema'
import type { Reading } from '../document/reading-schema'
import type { Answer, SiteAnswer } from './answer'
import { siteSentence } from './site-sentence'
import { verdictSentence } from './verdict-sentence'

/** An answer before its places and its verdict are put into words. */
export type UnexplainedAnswer = Omit<Answer, 'says' | 'sites'> & { sites: Omit<SiteAnswer, 'says'>[] }

/** Puts every place and the verdict into words. `circuit` is the model's own, whose names are kept. */
export function explain(
  circuit: Circuit,
  readings: readonly Reading[],
  unexplained: UnexplainedAnswer,
): Answer {
  const sites = unexplained.sites.map((site) => ({
    ...site,
    says: siteSentence(circuit, readings, unexplained.outcome, site),
  }))
  const answer = { ...unexplained, sites }
  return { ...answer, says: verdictSentence(circuit, readings, answer) }
}
