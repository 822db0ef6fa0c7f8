import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { Worker } from 'node:worker_threads'
import type { Opened } from '@/diagrams/document/open-circuit'
import type { Answer } from '@/diagrams/faults/answer'

export type Reply = Opened<Answer>

/** Questions that may wait for the thread; whoever comes later is told to come again. */
const mostWaiting = 8
const startMilliseconds = 60_000
const mostMegabytes = 1024

const loadSource = `
  import('tsx/esm/api').then(({ register }) => {
    register()
    return import(require('node:worker_threads').workerData)
  })
`

// On globalThis, since a development server loads this module anew with every change.
const store = globalThis as {
  halfsplitEvaluator?: { thread: Promise<Worker> | null; waiting: number; last: Promise<unknown> }
}
const evaluator = (store.halfsplitEvaluator ??= { thread: null, waiting: 0, last: Promise.resolve() })

/**
 * Evaluates in a thread of its own, so that arithmetic, which grows fast with the circuit, never holds up
 * anybody's page. One question after the other; one that takes longer than it may is given up, with its thread.
 */
export async function evaluateApart(
  input: unknown,
  milliseconds: number,
): Promise<Reply | 'too-long' | 'busy'> {
  if (evaluator.waiting >= mostWaiting) return 'busy'
  evaluator.waiting++
  const turn = evaluator.last.then(() => answerTo(input, milliseconds))
  evaluator.last = turn.catch(() => {})
  try {
    return await turn
  } finally {
    evaluator.waiting--
  }
}

/** The thread, once it takes questions; the first who asks waits for its start. */
export function evaluatorReady(): Promise<Worker> {
  return (evaluator.thread ??= startThread())
}

async function answerTo(input: unknown, milliseconds: number): Promise<Reply | 'too-long'> {
  const thread = await evaluatorReady()
  thread.postMessage(input)
  try {
    return (await next(thread, milliseconds)) as Reply
  } catch (error) {
    evaluator.thread = null
    await thread.terminate()
    // Running out of memory is running out of room all the same: the circuit asks for too much.
    if (error instanceof TooLong || (error as { code?: unknown }).code === 'ERR_WORKER_OUT_OF_MEMORY')
      return 'too-long'
    throw error
  }
}

async function startThread(): Promise<Worker> {
  // From the source, by its path: the bundle of the web server has no part in it.
  const source = path.join(process.cwd(), 'lib/server/evaluator/evaluator-thread.ts')
  const thread = new Worker(loadSource, {
    eval: true,
    workerData: pathToFileURL(source).href,
    resourceLimits: { maxOldGenerationSizeMb: mostMegabytes },
  })
  // One that ends between two questions is started anew by the next.
  thread.on('exit', () => (evaluator.thread = null)).on('error', () => {})
  thread.unref()
  try {
    await next(thread, startMilliseconds)
    return thread
  } catch (error) {
    evaluator.thread = null
    await thread.terminate()
    throw error
  }
}

class TooLong extends Error {}

/** The thread's next message; its end, its error or the end of the time is thrown. */
function next(thread: Worker, milliseconds: number): Promise<unknown> {
  return new Promise((resolve, reject) => {
    const settle = (end: () => void) => {
      clearTimeout(timer)
      thread.off('message', onMessage).off('error', onError).off('exit', onExit)
      end()
    }
    const onMessage = (message: unknown) => settle(() => resolve(message))
    const onError = (error: unknown) => settle(() => reject(error))
    const onExit = (code: number) =>
      settle(() => reject(new Error(`the evaluator's thread ended, code ${code}`)))
    const timer = setTimeout(() => settle(() => reject(new TooLong())), milliseconds)
    thread.on('message', onMessage).on('error', onError).on('exit', onExit)
  })
}
