import { evaluate } from '@/diagrams/evaluate'
import type { Answered, Asked } from './messages'

/** The evaluator off the main thread, so that a key press is never kept waiting by arithmetic. */
self.onmessage = (event: MessageEvent<Asked>) => {
  const { number, question } = event.data
  self.postMessage(answer(number, question))
}

function answer(number: number, question: Asked['question']): Answered {
  try {
    return { number, ok: true, answer: evaluate(question) }
  } catch (error) {
    return { number, ok: false, message: error instanceof Error ? error.message : String(error) }
  }
}
