import type { Worker } from 'node:worker_threads'
import { nextMessage } from './next-message'
import { sourceThread } from './source-thread'
import { answerOf, Deaf, type GivenUp } from './thread-answer'
import type { Reply } from './thread-messages'

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
 * anybody's page. One question after the other; one that takes longer than it may is given up, and so is one that nobody
 * waits for any more. What the thread knows of circuits is kept, unless it no longer listens.
 */
export async function evaluateApart(
  input: unknown,
  milliseconds: number,
  signal?: AbortSignal,
): Promise<Reply | GivenUp | 'busy'> {
  if (evaluator.waiting >= mostWaiting) return 'busy'
  evaluator.waiting++
  const turn = evaluator.last.then(() => answerTo(input, milliseconds, signal))
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

async function answerTo(
  input: unknown,
  milliseconds: number,
  signal: AbortSignal | undefined,
): Promise<Reply | GivenUp> {
  if (signal?.aborted) return 'gone'
  const thread = await evaluatorReady()
  try {
    return await answerOf(thread, input, milliseconds, signal)
  } catch (error) {
    evaluator.thread = null
    await thread.terminate()
    if (error instanceof Deaf) return error.why
    // Running out of memory is running out of room all the same: the circuit asks for too much.
    if ((error as { code?: unknown }).code === 'ERR_WORKER_OUT_OF_MEMORY') return 'too-long'
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
