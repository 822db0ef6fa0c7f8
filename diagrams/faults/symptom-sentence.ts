import type { Circuit } from '../document/circuit-schema'
import { nodeName } from '../document/points'
import type { Outcome } from './answer'
import type { Symptom } from './symptom-schema'

/** "Fan motor does not work", "it stops at step 3". */
export function symptomWords(circuit: Circuit, symptom: Symptom): string {
  if ('step' in symptom)
    return `it stops at step ${circuit.sequence.findIndex((step) => step.id === symptom.step) + 1}`
  const node = circuit.nodes.find((n) => n.id === symptom.node)
  const name = node ? nodeName(node) : symptom.node
  switch (symptom.does) {
    case 'not-work':
      return `${name} does not work`
    case 'always':
      return `${name} works where it should not`
    case 'weakly':
      return `${name} works weakly`
  }
}

/**
 * The complaint beside the verdict. `explains` holds a sign for each symptom, "1" where the fault that was found does
 * that. Empty without a complaint.
 */
export function symptomSentence(
  circuit: Circuit,
  symptoms: readonly Symptom[],
  outcome: Outcome,
  explains: string,
): string {
  if (symptoms.length === 0) return ''
  const words = symptoms.map((symptom) => symptomWords(circuit, symptom))
  if (outcome === 'no-fault')
    return `That leaves unexplained what was told: ${words.join('; ')}. It may come and go, or lie outside this circuit.`
  if (outcome !== 'located') return `Told, and weighed with it: ${words.join('; ')}.`
  const why = words.filter((_, i) => explains[i] === '1')
  const not = words.filter((_, i) => explains[i] !== '1')
  return [
    why.length > 0 ? `It explains what was told: ${why.join('; ')}.` : '',
    not.length > 0 ? `It does not explain: ${not.join('; ')}. Look for that, too.` : '',
  ]
    .filter(Boolean)
    .join(' ')
}
