import type { Worker } from 'node:worker_threads'
import type { Opened } from '@/diagrams/document/open-circuit'
import type { Answer } from '@/diagrams/faults/answer'
import { nextMessage, TooLong } from './next-message'
import { sourceThread } from './source-thread'

export type Reply = Opened<Answer>

/** Questions that may wait for the thread; whoever comes later is told to come again. */
const mostWaiting = 8
const startMilliseconds = 60_000
const mostMegabytes = 1024

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
    return (await nextMessage(thread, milliseconds)) as Reply
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
  const thread = sourceThread('lib/server/evaluator/evaluator-thread.ts', mostMegabytes)
  // One that ends between two questions is started anew by the next.
  thread.on('exit', () => (evaluator.thread = null))
  try {
    await nextMessage(thread, startMilliseconds)
    return thread
  } catch (error) {
    evaluator.thread = null
    await thread.terminate()
    throw error
  }
}
