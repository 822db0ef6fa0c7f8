import { evaluateSteps } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { QuestionRunner } from '@/lib/shared/evaluator/question-runner'
import type { Asked, Question } from './messages'
import { WholeQuestions } from './whole-question'

/** A turn through the queue of messages, without the delay that a timer would be given. */
const turn = new MessageChannel()
const waiting: (() => void)[] = []
turn.port1.onmessage = () => waiting.shift()?.()

const questions = new WholeQuestions()
const runner = new QuestionRunner<Question, Answer>(evaluateSteps, {
  now: () => performance.now(),
  pause: () =>
    new Promise((resolve) => {
      waiting.push(resolve)
      turn.port2.postMessage(null)
    }),
  tell: (told) => self.postMessage(told),
})

/** The evaluator off the main thread, so that a key press is never kept waiting by arithmetic. */
self.onmessage = (event: MessageEvent<Asked>) => runner.ask(event.data.number, questions.open(event.data))
