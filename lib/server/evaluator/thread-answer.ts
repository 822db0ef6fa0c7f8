import type { Worker } from 'node:worker_threads'
import type { Told } from '@/lib/shared/evaluator/question-runner'
import type { EvaluatorAsk, Reply } from './thread-messages'

/** Why a question was given up: it took longer than it may, or whoever asked has gone. */
export type GivenUp = 'too-long' | 'gone'

/** The thread did not even hear that the question was given up. */
export class Deaf extends Error {
  constructor(readonly why: GivenUp) {
    super(`the evaluator's thread does not listen: ${why}`)
  }
}

/** A portion of work is milliseconds; one that takes this long will not end soon. */
const listenMilliseconds = 5000

let lastNumber = 0

/** The thread's answer to one question; its end, its error and its deafness are thrown. */
export function answerOf(
  thread: Worker,
  input: unknown,
  milliseconds: number,
  signal?: AbortSignal,
): Promise<Reply | GivenUp> {
  const number = ++lastNumber
  const send = (ask: EvaluatorAsk) => thread.postMessage(ask)
  return new Promise((resolve, reject) => {
    let givenUp: GivenUp | null = null
    const settle = (end: () => void) => {
      clearTimeout(timer)
      signal?.removeEventListener('abort', onAbort)
      thread.off('message', onMessage).off('error', onError).off('exit', onExit)
      end()
    }
    const giveUp = (why: GivenUp) => {
      if (givenUp) return
      givenUp = why
      send({ do: 'drop', number })
      clearTimeout(timer)
      timer = setTimeout(() => settle(() => reject(new Deaf(why))), listenMilliseconds)
    }
    const onMessage = (told: Told<Reply>) => {
      if (told.number !== number) return
      if ('dropped' in told) settle(() => resolve(givenUp ?? 'gone'))
      if ('ok' in told) {
        if (told.ok) settle(() => resolve(givenUp ?? told.answer))
        else settle(() => reject(new Error(told.message)))
      }
    }
    const onError = (error: unknown) => settle(() => reject(error))
    const onExit = (code: number) =>
      settle(() => reject(new Error(`the evaluator's thread ended, code ${code}`)))
    const onAbort = () => giveUp('gone')
    let timer = setTimeout(() => giveUp('too-long'), milliseconds)
    signal?.addEventListener('abort', onAbort)
    thread.on('message', onMessage).on('error', onError).on('exit', onExit)
    send({ do: 'ask', number, input })
  })
}
