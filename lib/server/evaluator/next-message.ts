import type { Worker } from 'node:worker_threads'

export class TooLong extends Error {}

/** The thread's next message; its end, its error or the end of the time is thrown. */
export function nextMessage(thread: Worker, milliseconds: number): Promise<unknown> {
  return new Promise((resolve, reject) => {
    const settle = (end: () => void) => {
      clearTimeout(timer)
      thread.off('message', onMessage).off('error', onError).off('exit', onExit)
      end()
    }
    const onMessage = (message: unknown) => settle(() => resolve(message))
    const onError = (error: unknown) => settle(() => reject(error))
    const onExit = (code: number) => settle(() => reject(new Error(`the thread ended, code ${code}`)))
    const timer = setTimeout(() => settle(() => reject(new TooLong())), milliseconds)
    thread.on('message', onMessage).on('error', onError).on('exit', onExit)
  })
}
