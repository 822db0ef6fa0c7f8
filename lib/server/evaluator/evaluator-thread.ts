import { parentPort } from 'node:worker_threads'
import { evaluateSteps } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import type { Steps } from '@/diagrams/faults/steps'
import { QuestionRunner, type Told } from '@/lib/shared/evaluator/question-runner'
import type { EvaluatorAsk, Reply } from './thread-messages'

/** What the thread runs: the same runner as in the browser, with the door in front, since here nobody has checked the question. */
const runner = new QuestionRunner<unknown, Reply>(openAndEvaluate, {
  now: () => performance.now(),
  pause: () => new Promise((resolve) => setImmediate(resolve)),
  tell: (told: Told<Reply>) => parentPort?.postMessage(told),
})

function* openAndEvaluate(input: unknown): Steps<Reply> {
  const opened = openEvaluationRequest(input)
  return opened.ok ? { ok: true, value: yield* evaluateSteps(opened.value) } : opened
}

parentPort?.on('message', (ask: EvaluatorAsk) => {
  if (ask.do === 'ask') runner.ask(ask.number, ask.input)
  else runner.drop(ask.number)
})
parentPort?.postMessage('ready')
