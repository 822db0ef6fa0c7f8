import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Answer } from '@/diagrams/faults/answer'
import type { Step } from '@/diagrams/faults/steps'
import type { Answered, Asked, Question } from './messages'

/** The part of a Worker that is used here, so that a test can stand in for the thread. */
export interface Thread {
  postMessage(message: Asked): void
  onmessage: ((event: MessageEvent<Answered>) => void) | null
  onerror: ((event: ErrorEvent) => void) | null
  terminate(): void
}

export interface Listener {
  answered(answer: Answer, question: Question): void
  failed(message: string, question: Question): void
  /** Only for the newest question, and only when it takes long. */
  progressed(step: Step, question: Question): void
  /** Runs something after so many milliseconds; what comes back calls it off. */
  later(milliseconds: number, run: () => void): () => void
}

/** A thread that says nothing for this long while it is asked is taken for dead. */
export const silenceMilliseconds = 60_000

interface Numbered {
  number: number
  question: Question
}

/**
 * Sends each question to the thread, which leaves an older one for it. At most two are with the thread, the one it works on
 * and the newest: what is asked meanwhile replaces the one that waits here. An answer to a question no longer asked
 * is not told. A thread that dies is started anew, once for each question.
 */
export class Evaluator {
  private thread: Thread | null = null
  private number = 0
  /** The newest question asked, until it is answered. */
  private newest: Numbered | null = null
  private sentNumber = 0
  private takenNumber = 0
  private circuitSent: Circuit | null = null
  /** The question for which a dead thread has been replaced. */
  private triedAgain = 0
  private callOff: (() => void) | null = null

  constructor(
    private readonly start: () => Thread,
    private readonly listener: Listener,
  ) {}

  ask(question: Question): void {
    this.newest = { number: ++this.number, question }
    this.sendNewest()
  }

  close(): void {
    this.newest = null
    this.endThread()
  }

  private sendNewest(): void {
    const { newest } = this
    // One that the thread has not taken up yet is with it already: this one waits until it has.
    if (!newest || newest.number <= this.sentNumber || this.sentNumber > this.takenNumber) return
    const { circuit, ...question } = newest.question
    const isNew = circuit !== this.circuitSent
    const thread = this.openThread()
    this.sentNumber = newest.number
    this.circuitSent = circuit
    thread.postMessage({ number: newest.number, question: isNew ? { ...question, circuit } : question })
    this.watch()
  }

  private openThread(): Thread {
    if (this.thread) return this.thread
    const thread = this.start()
    thread.onmessage = (event) => this.receive(event.data)
    thread.onerror = (event) => this.lose(event.message)
    this.thread = thread
    return thread
  }

  private receive(told: Answered): void {
    this.takenNumber = Math.max(this.takenNumber, told.number)
    const asked = this.newest
    if (asked && told.number === asked.number) {
      if ('progress' in told) this.listener.progressed(told.progress, asked.question)
      if ('ok' in told) {
        this.newest = null
        if (told.ok) this.listener.answered(told.answer, asked.question)
        else this.listener.failed(told.message, asked.question)
      }
    }
    this.watch()
    this.sendNewest()
  }

  /** The thread could not be loaded, or has died: a new one knows nothing of what was sent. */
  private lose(message: string): void {
    const asked = this.newest
    this.endThread()
    if (!asked) return
    if (this.triedAgain === asked.number) {
      this.newest = null
      this.listener.failed(message || 'The evaluator did not start. Reload the page.', asked.question)
      return
    }
    this.triedAgain = asked.number
    this.sendNewest()
  }

  private endThread(): void {
    this.callOff?.()
    this.callOff = null
    if (this.thread) {
      this.thread.onmessage = null
      this.thread.onerror = null
      this.thread.terminate()
    }
    this.thread = null
    this.circuitSent = null
    this.sentNumber = 0
    this.takenNumber = 0
  }

  private watch(): void {
    this.callOff?.()
    this.callOff = this.newest
      ? this.listener.later(silenceMilliseconds, () =>
          this.lose('The evaluator has stopped. Reload the page.'),
        )
      : null
  }
}
