import type { Step } from '@/diagrams/faults/steps'

const stageWords: Record<Step['stage'], string> = {
  circuit: 'Circuit learned',
  readings: 'Readings weighed',
  planning: 'Next split',
}

/** "Circuit learned: 40 %": how far an answer has come that takes its time. */
export function stepWords({ stage, done, of }: Step): string {
  return `${stageWords[stage]}: ${of > 0 ? Math.floor((100 * done) / of) : 0} %`
}
